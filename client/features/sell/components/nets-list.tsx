import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Money } from '../../../components/figures/money.tsx';
import { DataList } from '../../../components/ui/data-list.tsx';
import { formatMoney, formatPercent } from '../../../lib/format.ts';

const methodNames = { card: 'Paid by card', bank_debit: 'Paid by bank debit' } as const;

/** What goes to the seller by each payment method. */
export function NetsList({ nets }: { nets: LotAnswer['nets'] }) {
  return (
    <section aria-label="To you, by how the buyer pays" className="sheet p-4">
      <h2 className="mb-2 text-lead">To you, by how the buyer pays</h2>
      <DataList
        rows={nets.map((line) => ({
          key: line.method,
          term: methodNames[line.method],
          data: (
            <>
              <Money value={line.net.amount} className="font-semibold" />{' '}
              <span className="block text-note text-ink-2">
                after {formatMoney(line.commission.amount)} commission ({formatPercent(line.percent)}, at
                least {formatMoney(line.minimum.amount)})
              </span>
            </>
          ),
        }))}
      />
    </section>
  );
}
