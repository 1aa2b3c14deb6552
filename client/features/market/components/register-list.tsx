import { useInfiniteQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { RegisterAnswer } from '#shared/schemas/lots.ts';
import { fitWindow, sizes } from '../../../components/figures/melt-rule-geometry.ts';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { Button, LinkButton } from '../../../components/ui/button.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { registerQuery } from '../api/register-query.ts';
import { useWide } from '../hooks/use-wide.ts';
import { isNarrowed, registerHref, plainFilters, type RegisterFilters } from '../register-filters.ts';
import { QuoteStateNotice } from '../../../components/figures/quote-state-notice.tsx';
import { rowMarks } from './register-row-parts.tsx';
import { RegisterTable } from './register-table.tsx';
import { RegisterTickets } from './register-tickets.tsx';
import { countText, filtersText } from './register-words.ts';

type RegisterListProps = { filters: RegisterFilters };

/** The rows under the filters, with the way to further ones; how many are shown stands in the address. */
export function RegisterList({ filters }: RegisterListProps) {
  const query = useInfiniteQuery(registerQuery(filters));
  const [, setSearch] = useSearchParams();
  const list = useRef<HTMLDivElement>(null);
  const focusFrom = useRef<string | null>(null);
  const pages = query.data?.pages;
  const rows = pages?.flatMap((page) => page.rows) ?? [];
  const firstNew = rows.findIndex((row) => row.code === focusFrom.current) + 1;
  useEffect(() => {
    const row = focusFrom.current === null || firstNew === 0 ? undefined : rows[firstNew];
    if (!row) return;
    focusFrom.current = null;
    list.current?.querySelector<HTMLElement>(`[data-lot="${row.code}"]`)?.focus({ preventScroll: true });
  });
  if (query.isPending) return <Skeleton lines={8} label="Loading the register" />;
  if (!pages?.[0])
    return <ErrorState error={query.error} what="The register" onRetry={() => query.refetch()} />;

  const further = async () => {
    focusFrom.current = rows.at(-1)?.code ?? null;
    const { data } = await query.fetchNextPage();
    if (!data) return;
    setSearch(
      (search) => {
        search.set('pages', data.pages.length.toString());
        return search;
      },
      { replace: true, preventScrollReset: true },
    );
  };
  return (
    <div ref={list}>
      <ListHead answer={pages[0]} filters={filters} isStaleShown={query.isError} />
      {rows.length === 0 ? <EmptyRegister filters={filters} /> : <ListRows answer={pages[0]} rows={rows} />}
      {query.isFetchNextPageError && (
        <div className="mt-4">
          <ErrorState error={query.error} what="Further lots" onRetry={further} />
        </div>
      )}
      {query.hasNextPage && !query.isFetchNextPageError && (
        <Button
          look="second"
          className="mt-5"
          busy={query.isFetchingNextPage}
          busyText="Fetching further lots"
          onClick={further}
        >
          Further lots
        </Button>
      )}
    </div>
  );
}

type ListHeadProps = { answer: RegisterAnswer; filters: RegisterFilters; isStaleShown: boolean };

function ListHead({ answer, filters, isStaleShown }: ListHeadProps) {
  const chosen = filtersText(filters);
  return (
    <>
      <p role="status" className="mb-3 flex flex-wrap gap-x-3 text-note text-ink-2">
        <span>
          <span className="font-medium text-ink">{countText(answer)}</span>
          {chosen && `: ${chosen}`}
        </span>
        {isStaleShown && <span className="text-litharge">as last received; it could not be read again</span>}
      </p>
      {answer.rows.length > 0 && (
        <QuoteStateNotice state={answer.quoteState} at={answer.quotedAt} className="mb-4" />
      )}
    </>
  );
}

type ListRowsProps = { answer: RegisterAnswer; rows: RegisterAnswer['rows'] };

function ListRows({ answer, rows }: ListRowsProps) {
  const isWide = useWide();
  const window = fitWindow(sizes.row.window, null, rows.flatMap(rowMarks));
  const Rows = isWide ? RegisterTable : RegisterTickets;
  return <Rows rows={rows} quotedAt={answer.quotedAt} window={window} />;
}

function EmptyRegister({ filters }: RegisterListProps) {
  const isFiltered = isNarrowed(filters);
  return (
    <EmptyState
      drawing={<SpecimenDrawing form={filters.form ?? 'bar'} metal={filters.metal ?? 'Au'} label={null} />}
      title={isFiltered ? 'No open lot is like that' : 'No lot is open now'}
      action={
        isFiltered && (
          <LinkButton to={registerHref(plainFilters(filters.sort))}>Show every open lot</LinkButton>
        )
      }
    >
      {isFiltered
        ? 'Take one of the choices off, or widen a range.'
        : 'A lot stands here once the desk has confirmed its certificate. Look again later.'}
    </EmptyState>
  );
}
