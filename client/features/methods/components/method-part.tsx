import type { ReactNode } from 'react';

type MethodPartProps = { id: string; title: string; source?: ReactNode; children: ReactNode };

/** One matter, how it is done, and where that comes from. */
export function MethodPart({ id, title, source, children }: MethodPartProps) {
  return (
    <section aria-labelledby={id} className="mt-12 scroll-mt-4">
      <h2 id={id} className="mb-3 border-b border-rule pb-2">
        {title}
      </h2>
      <div className="flex flex-col items-start gap-4">{children}</div>
      {source && <p className="mt-4 max-w-prose text-note text-ink-2">Sources: {source}</p>}
    </section>
  );
}

export function Prose({ children }: { children: ReactNode }) {
  return <p className="max-w-prose">{children}</p>;
}

export function Formula({ children }: { children: ReactNode }) {
  return (
    <p
      className="max-w-full overflow-x-auto border-l-2 border-line py-1 pl-4 font-mono text-note"
      tabIndex={0}
    >
      {children}
    </p>
  );
}

type FigureTableProps = {
  caption: string;
  heads: { text: string; isFigure?: boolean }[];
  rows: { key: string; cells: ReactNode[] }[];
};

/** A ruled table; figures stand right, words left; on a narrow screen it scrolls inside itself. */
export function FigureTable({ caption, heads, rows }: FigureTableProps) {
  const align = (index: number) => (heads[index]?.isFigure ? 'text-right fig' : 'text-left');
  return (
    <div className="max-w-full overflow-x-auto" tabIndex={0} role="region" aria-label={caption}>
      <table className="border-collapse">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-ink text-note text-ink-2">
            {heads.map(({ text, isFigure }) => (
              <th
                key={text}
                scope="col"
                className={`py-2 pr-6 font-normal ${isFigure ? 'text-right' : 'text-left'}`}
              >
                {text}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map(({ key, cells }) => (
            <tr key={key} className="border-b border-rule align-baseline">
              {cells.map((cell, index) => (
                <td key={heads[index]?.text} className={`py-2 pr-6 ${align(index)}`}>
                  {cell}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
