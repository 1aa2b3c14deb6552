import type { ReactNode } from 'react';
import { formatShortMoment, formatZone } from '../../lib/format.ts';
import { useReader } from '../../lib/reader-context.ts';
import { Deadline } from '../ui/time.tsx';
import { Money } from './money.tsx';

export type DealEntry = {
  id: string;
  at: string;
  act: ReactNode;
  who: string;
  /** What is held in escrow after this act; null while nothing is. */
  held: string | null;
};

export type DueNext = {
  /** 'Inspect by' */
  what: string;
  at: string | null;
  /** What is to be done, and what silence will mean. */
  text: ReactNode;
  /** Buttons, where it is the reader who acts. */
  actions?: ReactNode;
  isYours: boolean;
};

type RegisterOfDealProps = { entries: DealEntry[]; due: DueNext | null };

/** A ruled page of the book: what was done, by whom, and what is held since; under the last line what is due next. */
export function RegisterOfDeal({ entries, due }: RegisterOfDealProps) {
  const { timeZone } = useReader();
  const zone = formatZone(entries[0]?.at ?? new Date().toISOString(), timeZone);
  return (
    <div>
      <table className="w-full border-collapse">
        <thead>
          <tr className="border-b border-ink text-note text-ink-2">
            <th scope="col" className="hidden w-px py-2 pr-5 text-left font-normal sm:table-cell">
              date, {zone}
            </th>
            <th scope="col" className="py-2 pr-4 text-left font-normal">
              act
            </th>
            <th scope="col" className="hidden py-2 pr-4 text-left font-normal sm:table-cell">
              who
            </th>
            <th scope="col" className="py-2 text-right font-normal">
              held, US$
            </th>
          </tr>
        </thead>
        <tbody>
          {entries.map((entry) => (
            <tr key={entry.id} className="border-b border-rule align-baseline">
              <td className="hidden py-2.5 pr-5 sm:table-cell">
                <time dateTime={entry.at} className="fig text-note text-ink-2">
                  {formatShortMoment(entry.at, timeZone)}
                </time>
              </td>
              <td className="py-2.5 pr-4">
                <span className="mb-0.5 block text-note text-ink-2 sm:hidden">
                  <time dateTime={entry.at} className="fig">
                    {formatShortMoment(entry.at, timeZone)}
                  </time>
                  , {entry.who}
                </span>
                {entry.act}
              </td>
              <td className="hidden py-2.5 pr-4 text-ink-2 sm:table-cell">{entry.who}</td>
              <td className="py-2.5 text-right">
                {entry.held === null ? (
                  <span className="fig text-ink-2" aria-label="nothing">
                    –
                  </span>
                ) : (
                  <Money bare value={entry.held} />
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {due && <DueNextPanel due={due} />}
    </div>
  );
}

export function DueNextPanel({ due }: { due: DueNext }) {
  return (
    <section
      aria-label="Due next"
      className={`mt-5 rounded-box border bg-sheet p-5 ${due.isYours ? 'border-2 border-verdigris' : 'border-line'}`}
    >
      <h2 className="text-lead">
        {due.what} {due.at && <Deadline at={due.at} />}
      </h2>
      <div className="mt-1 max-w-prose text-ink-2">{due.text}</div>
      {due.actions && <div className="no-print mt-4 flex flex-wrap gap-3">{due.actions}</div>}
    </section>
  );
}
