import { useQuery } from '@tanstack/react-query';
import { MASS_UNIT_LABELS } from '#shared/mass.ts';
import { METAL_NAMES, type Metal } from '#shared/metals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { formatDate } from '../../../lib/format.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { quoteHistoryQuery } from '../api/quote-history-query.ts';
import { pricePerUnit } from '../../../lib/shown-figures.ts';
import { QuoteHistoryChart } from './quote-history-chart.tsx';

/** The last sixty days of one metal, as a line and as a table, in the reader's unit. */
export function QuoteHistory({ metal }: { metal: Metal }) {
  const { weightUnit } = useReader();
  const { data, error, isPending, refetch } = useQuery(quoteHistoryQuery(metal));
  if (isPending)
    return <Skeleton lines={4} label={`Loading the history of ${METAL_NAMES[metal].toLowerCase()}`} />;
  if (!data) return <ErrorState error={error} what="The history" onRetry={() => refetch()} />;
  const unitLabel = MASS_UNIT_LABELS[weightUnit];
  const history = data.points.map(({ day, usdPerTroyOunce }) => ({
    day,
    price: pricePerUnit(usdPerTroyOunce, weightUnit),
  }));
  if (history.length < 2)
    return <p className="text-note text-ink-2">A line appears here once two days have a quote.</p>;
  const sources = [...new Set(data.points.map(({ source }) => source))];
  return (
    <div>
      <p className="mb-1 text-note text-ink-2">
        US$ per {unitLabel}, first accepted quote of each day (UTC), {history.length} days
      </p>
      <QuoteHistoryChart metal={metal} unitLabel={unitLabel} history={history} />
      <details className="mt-1 text-note">
        <summary className="inline-block min-h-6 py-0.5 underline underline-offset-4">
          The same as a table<span className="sr-only">: {METAL_NAMES[metal]}</span>
        </summary>
        <div
          className="mt-2 max-h-80 overflow-y-auto border-y border-rule"
          tabIndex={0}
          role="region"
          aria-label={`${METAL_NAMES[metal]}, day by day`}
        >
          <table className="w-full max-w-sm border-collapse">
            <thead>
              <tr className="border-b border-rule text-ink-2">
                <th scope="col" className="py-1 text-left font-normal">
                  day
                </th>
                <th scope="col" className="py-1 pr-3 text-right font-normal">
                  US$ per {unitLabel}
                </th>
              </tr>
            </thead>
            <tbody>
              {history.toReversed().map(({ day, price }) => (
                <tr key={day} className="border-b border-rule last:border-0">
                  <th scope="row" className="py-1 text-left font-normal">
                    {formatDate(day)}
                  </th>
                  <td className="py-1 pr-3 text-right">
                    <Money bare value={price} />
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
        <p className="mt-1 text-ink-2">Source: {sources.join(', ')}</p>
      </details>
    </div>
  );
}
