import { useSuspenseInfiniteQuery } from '@tanstack/react-query';
import type { AuditAnswer } from '#shared/schemas/desk.ts';
import { Button } from '../../../components/ui/button.tsx';
import { DataList } from '../../../components/ui/data-list.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { auditQuery } from '../api/audit.ts';
import { DeskPage } from './desk-page.tsx';

function said(value: unknown): string {
  return typeof value === 'string' ? value : JSON.stringify(value);
}

function Line({ row }: { row: AuditAnswer['rows'][number] }) {
  const details = Object.entries(row.detail);
  return (
    <li className="grid gap-x-6 gap-y-1 border-b border-rule py-3 md:grid-cols-[minmax(0,3fr)_minmax(0,3fr)_minmax(0,3fr)_minmax(0,5fr)]">
      <Time at={row.at} />
      <div>
        {row.who} <span className="text-note text-ink-2">{row.role === row.who ? '' : row.role}</span>
      </div>
      <div className="font-medium">{row.act.replaceAll('-', ' ')}</div>
      <div className="min-w-0 break-words">
        {row.subject}
        {details.length > 0 && (
          <details className="text-note">
            <summary className="py-1 text-ink-2">Details</summary>
            <DataList rows={details.map(([term, value]) => ({ term, key: term, data: said(value) }))} />
          </details>
        )}
      </div>
    </li>
  );
}

/** Who did what at the desk, newest first. Nobody can change or remove a line. */
export function AuditPage() {
  const { data, fetchNextPage, hasNextPage, isFetchingNextPage, error, isFetchNextPageError } =
    useSuspenseInfiniteQuery(auditQuery);
  const rows = data.pages.flatMap((page) => page.rows);
  return (
    <DeskPage title="Audit trail" sub="Newest first. Lines are only ever added.">
      {rows.length === 0 ? (
        <EmptyState title="Nothing has been done yet" />
      ) : (
        <ol className="border-t border-rule">
          {rows.map((row, index) => (
            <Line key={`${row.at}:${index}`} row={row} />
          ))}
        </ol>
      )}
      {isFetchNextPageError && <ErrorState error={error} onRetry={() => void fetchNextPage()} />}
      {hasNextPage && (
        <Button look="second" className="mt-6" busy={isFetchingNextPage} onClick={() => void fetchNextPage()}>
          Earlier lines
        </Button>
      )}
    </DeskPage>
  );
}
