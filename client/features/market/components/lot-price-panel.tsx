import type { ReactNode } from 'react';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { MeltRule } from '../../../components/figures/melt-rule.tsx';
import { PriceFixPanel } from '../../../components/figures/price-fix-panel.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { Deadline } from '../../../components/ui/time.tsx';
import { formatMoney, formatPercent } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { bandOf, totalOf } from '../../../lib/shown-figures.ts';
import { stateWords } from '../../../components/figures/lot-state-words.ts';
import { sheetQuotedAt } from './lot-words.ts';

type LotPricePanelProps = { lot: LotAnswer; isSignedIn: boolean };

/** What the lot costs, where that stands against its melt value, and the way to it. */
export function LotPricePanel({ lot, isSignedIn }: LotPricePanelProps) {
  const { price, shipping, sheet } = lot;
  const total = totalOf(lot);
  return (
    <section aria-label="Price and purchase" className="sheet p-5">
      {lot.linkedPercent && <LinkedPrice lot={lot} total={total} />}
      {price && !lot.linkedPercent && (
        <>
          <p className="text-note text-ink-2">Outright price</p>
          <p className="text-head leading-tight">
            <Money value={price.amount} />
          </p>
          <p className="text-note text-ink-2">
            {sheet?.percentOfMelt && (
              <>
                <span className="fig">{formatPercent(sheet.percentOfMelt)}</span> of what its metal is worth{' '}
                {lot.quoteState === 'fresh' ? 'now' : 'at the last accepted quotes'};{' '}
              </>
            )}
            {shipping && (
              <>
                with the insured parcel of <Money value={shipping.amount} />, <Money value={total ?? '0'} />{' '}
                in all
              </>
            )}
          </p>
        </>
      )}
      <div className="mt-5">
        <MeltRule
          band={sheet && bandOf(sheet.melt)}
          marks={
            sheet?.percentOfMelt
              ? [{ kind: lot.linkedPercent ? 'linked' : 'price', percent: sheet.percentOfMelt }]
              : []
          }
          quote={sheet && { at: sheetQuotedAt(sheet) }}
        />
      </div>
      <div className="mt-5 flex flex-col items-start gap-3 border-t border-rule pt-4">
        <PriceFixPanel lot={lot} />
        <NextStep lot={lot} total={total} isSignedIn={isSignedIn} />
      </div>
    </section>
  );
}

/** The share of melt first, because it is what the seller asks; the sum follows the quote, or waits. */
function LinkedPrice({ lot, total }: { lot: LotAnswer; total: string | null }) {
  const { price, priceWait, linkedPercent, shipping } = lot;
  return (
    <>
      <p className="text-note text-ink-2">Price linked to the melt value</p>
      <p className="text-head leading-tight">linked {formatPercent(linkedPercent ?? '0')}</p>
      <p className="text-note text-ink-2">
        {price && (
          <>
            {priceWait ? 'At the last quotes' : 'Now'} <Money value={price.amount} />
            {shipping && total && (
              <>
                ; with the insured parcel of <Money value={shipping.amount} />, <Money value={total} /> in all
              </>
            )}
            .{' '}
          </>
        )}
        It follows the quote.
      </p>
    </>
  );
}

type NextStepProps = { lot: LotAnswer; total: string | null; isSignedIn: boolean };

function NextStep({ lot, total, isSignedIn }: NextStepProps): ReactNode {
  const closes = lot.state === 'open' && lot.closesAt && (
    <p className="text-note text-ink-2">
      Offered until <Deadline at={lot.closesAt} />
    </p>
  );
  const deal = lot.dealCode && (
    <LinkButton look="second" to={paths.deal(lot.dealCode)}>
      Open deal {lot.dealCode}
    </LinkButton>
  );
  if (lot.isMine)
    return (
      <>
        <p>
          <span className="font-medium text-lapis">This is your own lot.</span> {stateWords(lot)}
        </p>
        {closes}
        {deal}
      </>
    );
  if (lot.can.buy && total)
    return (
      <>
        <LinkButton to={paths.purchase(lot.code)}>Buy: {formatMoney(total)} into escrow</LinkButton>
        <p className="text-note text-ink-2">
          The money is held until you have weighed what arrives and accept it.
        </p>
        {closes}
      </>
    );
  if (lot.linkedPercent && (lot.can.fixPrice || (lot.state === 'open' && lot.priceWait))) return closes;
  if (lot.linkedPercent && lot.state === 'open' && !isSignedIn)
    return (
      <>
        <LinkButton to={paths.signIn(paths.lot(lot.code))}>Sign in to fix the price</LinkButton>
        {closes}
      </>
    );
  if (lot.state === 'open' && !isSignedIn && total)
    return (
      <>
        <LinkButton to={paths.signIn(paths.purchase(lot.code))}>
          Sign in to buy at {formatMoney(total)}
        </LinkButton>
        <p className="text-note text-ink-2">You come straight back to this purchase.</p>
        {closes}
      </>
    );
  return (
    <>
      <p>{stateWords(lot)}</p>
      {deal ?? (
        <LinkButton look="second" to={paths.register()}>
          Look at the other open lots
        </LinkButton>
      )}
    </>
  );
}
