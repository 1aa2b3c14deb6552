import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Time } from '../../../components/ui/time.tsx';
import { actWord } from '../lot-state-words.ts';

/** What happened to the lot, who did it, and why. */
export function LotHistory({ history }: { history: LotAnswer['history'] }) {
  if (history.length === 0) return null;
  return (
    <section aria-label="History">
      <h2 className="mb-2">History</h2>
      <ol className="border-b border-rule">
        {history.map((event) => (
          <li
            key={`${event.at} ${event.act}`}
            className="grid grid-cols-1 gap-x-5 border-t border-rule py-2 sm:grid-cols-[11.5rem_minmax(0,1fr)_7rem]"
          >
            <span className="fig text-note text-ink-2">
              <Time at={event.at} />
            </span>
            <span>
              {actWord(event.act)}
              {event.note && <span className="block max-w-prose text-ink-2">{event.note}</span>}
            </span>
            <span className="text-note text-ink-2 sm:text-right">{event.who}</span>
          </li>
        ))}
      </ol>
    </section>
  );
}
