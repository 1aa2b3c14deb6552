import { useEffect, type ReactNode } from 'react';
import { cx } from '../../lib/cx.ts';

type PageProps = {
  /** Also the title of the document. */
  title: string;
  /** What is seen as heading when it is more than the plain title. */
  heading?: ReactNode;
  sub?: ReactNode;
  aside?: ReactNode;
  children: ReactNode;
  className?: string;
};

/** One page: its heading, the line under it, its content. */
export function Page({ title, heading, sub, aside, children, className }: PageProps) {
  useEffect(() => {
    document.title = `${title} · Scruple`;
  }, [title]);
  return (
    <div className={cx(className)}>
      <div className="mb-6 flex flex-wrap items-end justify-between gap-x-8 gap-y-3">
        <div className="min-w-0">
          <h1 tabIndex={-1}>{heading ?? title}</h1>
          {sub && <div className="mt-1 text-note text-ink-2">{sub}</div>}
        </div>
        {aside && <div className="no-print flex flex-wrap gap-3">{aside}</div>}
      </div>
      {children}
    </div>
  );
}
