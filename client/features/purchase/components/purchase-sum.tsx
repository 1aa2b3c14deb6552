import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Money } from '../../../components/figures/money.tsx';
import { formatPercent } from '../../../lib/format.ts';

type PurchaseSumProps = { lot: LotAnswer; total: string };

const row = 'flex items-baseline justify-between gap-4 border-t border-rule py-2';

/** The sum once more, line by line, and whom it is for. */
export function PurchaseSum({ lot, total }: PurchaseSumProps) {
  return (
    <div className="sheet px-4 pb-1 pt-4">
      <p className="pb-3">
        You agree with <strong className="font-semibold">a member in {lot.seller.region}</strong> on{' '}
        <strong className="font-semibold">{lot.title}</strong>, lot <span className="fig">{lot.code}</span>.
      </p>
      <dl>
        <div className={row}>
          <dt>
            Price of the metal
            {lot.sheet?.percentOfMelt && (
              <span className="fig text-note text-ink-2">
                {' '}
                {formatPercent(lot.sheet.percentOfMelt)} of melt
              </span>
            )}
            {(lot.quoteState === 'stale' || lot.quoteState === 'partly') && (
              <span className="block text-note text-litharge">
                There is no fresh quote: the share of melt rests on an older one. The price stands.
              </span>
            )}
          </dt>
          <dd>
            <Money bare value={lot.price?.amount ?? '0'} />
          </dd>
        </div>
        <div className={row}>
          <dt>Insured parcel</dt>
          <dd>
            <Money bare value={lot.shipping?.amount ?? '0'} />
          </dd>
        </div>
        <div className="flex items-baseline justify-between gap-4 border-b-4 border-double border-b-ink border-t border-t-ink py-2 text-lead font-semibold [border-top-style:solid]">
          <dt>You pay into escrow</dt>
          <dd>
            <Money value={total} />
          </dd>
        </div>
      </dl>
      <p className="py-3 text-note text-ink-2">
        Nothing more comes on top. The seller is paid when you accept; until then the money is held.
      </p>
    </div>
  );
}
