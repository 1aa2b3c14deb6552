import type { ReactNode } from 'react';

type EmptyStateProps = { title: ReactNode; children?: ReactNode; drawing?: ReactNode; action?: ReactNode };

/** Nothing here yet: says why, and what to do about it. */
export function EmptyState({ title, children, drawing, action }: EmptyStateProps) {
  return (
    <div className="flex flex-col items-start gap-4 border-y border-rule py-10 sm:flex-row sm:items-center sm:gap-8">
      {drawing && <div className="w-28 shrink-0 text-ink-2">{drawing}</div>}
      <div>
        <p className="text-lead font-semibold">{title}</p>
        {children && <div className="mt-1 max-w-prose text-ink-2">{children}</div>}
        {action && <div className="mt-4 flex flex-wrap gap-3">{action}</div>}
      </div>
    </div>
  );
}
