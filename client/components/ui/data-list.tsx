import type { ReactNode } from 'react';
import { cx } from '../../lib/cx.ts';

export type DataListRow = { term: ReactNode; data: ReactNode; key?: string };

type DataListProps = { rows: DataListRow[]; className?: string };

/** Names and what they stand for, in two columns. */
export function DataList({ rows, className }: DataListProps) {
  return (
    <dl className={cx('grid grid-cols-[auto_minmax(0,1fr)] gap-x-5 gap-y-1.5', className)}>
      {rows.map((row, index) => (
        <div key={row.key ?? index} className="contents">
          <dt className="text-ink-2">{row.term}</dt>
          <dd className="min-w-0">{row.data}</dd>
        </div>
      ))}
    </dl>
  );
}
