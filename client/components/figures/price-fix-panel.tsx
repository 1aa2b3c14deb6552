import { PRICE_FIX_AGAIN_HOURS, PRICE_FIX_MINUTES } from '#shared/limits.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { formatLeft, formatMoney } from '../../lib/format.ts';
import { useNow } from '../../lib/use-now.ts';
import { usePriceFix } from '../../lib/use-price-fix.ts';
import { Button } from '../ui/button.tsx';
import { Notice } from '../ui/notice.tsx';
import { Time } from '../ui/time.tsx';
import { PriceWaitText } from './asked-price.tsx';
import { Money } from './money.tsx';

type PriceFixPanelProps = { lot: LotAnswer };

/** How a linked price stands for this reader: waiting, to be fixed, or fixed until then; nothing for another lot. */
export function PriceFixPanel({ lot }: PriceFixPanelProps) {
  if (lot.linkedPercent === null) return null;
  return (
    <div className="flex w-full flex-col items-start gap-3">
      {lot.priceFix ? (
        <FixStanding lot={lot} fix={lot.priceFix} />
      ) : (
        <>
          {lot.priceWait && lot.state === 'open' && (
            <p role="status" className="font-medium">
              The <PriceWaitText wait={lot.priceWait} />. Until then it cannot be fixed or bought.
            </p>
          )}
          {lot.can.fixPrice && <FixIt lot={lot} />}
        </>
      )}
    </div>
  );
}

/** 'fixed until 14:12 (9 min left)' for the holder with the sum, for others only the time. */
function FixStanding({ lot, fix }: { lot: LotAnswer; fix: NonNullable<LotAnswer['priceFix']> }) {
  const now = useNow(1_000);
  const left = formatLeft(fix.until, now);
  const { giveUp } = usePriceFix(lot.code);
  const until = (
    <>
      until <Time at={fix.until} show="clock" /> ({left ? `${left} left` : 'over'})
    </>
  );
  if (!fix.isMine) return <p role="status">Another buyer has fixed its price {until}.</p>;
  return (
    <>
      <p role="status">
        <span className="font-medium">
          Fixed for you at {fix.price && <Money value={fix.price.amount} />}, {until}.
        </span>{' '}
        Agree within this time; afterwards the price follows the quote again.
      </p>
      <Refusal error={giveUp.error} />
      <Button look="quiet" busy={giveUp.isPending} onClick={() => giveUp.mutate()}>
        Give the price fix up
      </Button>
    </>
  );
}

function FixIt({ lot }: PriceFixPanelProps) {
  const { fix } = usePriceFix(lot.code);
  return (
    <>
      <Refusal error={fix.error} />
      <Button busy={fix.isPending} busyText="Fixing the price" onClick={() => fix.mutate()}>
        Fix the price now{lot.price && `, about ${formatMoney(lot.price.amount)}`}
      </Button>
      <p className="max-w-prose text-note text-ink-2">
        The newest quote makes it a sum, and the lot is held for you for {PRICE_FIX_MINUTES} minutes. You owe
        nothing by it. One fix at a time, and the same lot again only after {PRICE_FIX_AGAIN_HOURS} hours.
      </p>
    </>
  );
}

function Refusal({ error }: { error: Error | null }) {
  return (
    error && (
      <Notice tone="attention" role="alert" title="The price fix was not changed">
        {error.message}
      </Notice>
    )
  );
}
