import type { RegisterAnswer } from '#shared/schemas/lots.ts';
import { Notice } from '../ui/notice.tsx';
import { Time } from '../ui/time.tsx';

type QuoteStateNoticeProps = { state: RegisterAnswer['quoteState']; at: string | null; className?: string };

/** Says plainly that figures rest on old quotes, or on none; silent while all quotes are fresh. */
export function QuoteStateNotice({ state, at, className }: QuoteStateNoticeProps) {
  if (state === 'fresh') return null;
  if (state === 'none')
    return (
      <Notice tone="attention" role="status" title="There is no quote" className={className}>
        What the metal is worth now is not known: melt values and the share of melt are left blank. Prices
        stand as the sellers set them.
      </Notice>
    );
  const since = at && (
    <>
      {' '}
      of <Time at={at} />
    </>
  );
  if (state === 'closed')
    return (
      <Notice role="status" title="The market is closed" className={className}>
        Melt values rest on its last quotes{since}.
      </Notice>
    );
  return (
    <Notice
      tone="attention"
      role="status"
      title={state === 'stale' ? 'There is no fresh quote' : 'Some quotes are not fresh'}
      className={className}
    >
      {state === 'stale' ? (
        <>Melt values rest on the last accepted quotes{since} and may have moved since.</>
      ) : (
        <>The oldest quote that figures here rest on is{since ?? ' older than it should be'}.</>
      )}
    </Notice>
  );
}
