import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Time } from '../../../components/ui/time.tsx';
import { formatZone } from '../../../lib/format.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { actWords } from './lot-words.ts';

/** What happened to the lot so far, as far as the reader may know it. */
export function LotHistory({ history }: Pick<LotAnswer, 'history'>) {
  const { timeZone } = useReader();
  const last = history.at(-1);
  if (!last) return null;
  return (
    <section aria-labelledby="lot-history">
      <h2 id="lot-history">History of the lot</h2>
      <div className="mt-3 overflow-x-auto" tabIndex={0} role="region" aria-labelledby="lot-history">
        <table className="w-full border-collapse text-[0.875rem]">
          <thead>
            <tr className="border-b border-ink text-note text-ink-2">
              <th scope="col" className="py-1.5 pr-5 text-left font-normal">
                date, {formatZone(last.at, timeZone)}
              </th>
              <th scope="col" className="py-1.5 pr-5 text-left font-normal">
                act
              </th>
              <th scope="col" className="py-1.5 text-left font-normal">
                who
              </th>
            </tr>
          </thead>
          <tbody>
            {history.map((event) => (
              <tr key={`${event.at}:${event.act}`} className="border-b border-rule align-baseline">
                <td className="fig py-1.5 pr-5">
                  <Time at={event.at} show="short" />
                </td>
                <td className="py-1.5 pr-5">
                  {actWords(event.act)}
                  {event.note && <span className="block text-note text-ink-2">{event.note}</span>}
                </td>
                <td className="py-1.5 text-ink-2">{event.who}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}
