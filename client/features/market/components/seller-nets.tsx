import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Money } from '../../../components/figures/money.tsx';
import { DataList } from '../../../components/ui/data-list.tsx';
import { formatPercent } from '../../../lib/format.ts';

const methods = { card: 'paid by card', bank_debit: 'paid by bank debit' } as const;

/** Only for the seller: what is left by each way of paying. */
export function SellerNets({ nets }: Pick<LotAnswer, 'nets'>) {
  if (nets.length === 0) return null;
  return (
    <section aria-labelledby="seller-nets" className="sheet p-5">
      <h2 id="seller-nets" className="text-lead">
        What comes to you
      </h2>
      <DataList
        className="mt-3"
        rows={nets.map((net) => ({
          key: net.method,
          term: methods[net.method],
          data: (
            <>
              <Money value={net.net.amount} className="font-medium" />{' '}
              <span className="text-note text-ink-2">
                after commission of <Money value={net.commission.amount} /> ({formatPercent(net.percent)}, at
                least <Money value={net.minimum.amount} />)
              </span>
            </>
          ),
        }))}
      />
    </section>
  );
}
