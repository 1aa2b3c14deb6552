import { useSuspenseQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { DeskDealsAnswer } from '#shared/schemas/desk.ts';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { Deadline, Time } from '../../../components/ui/time.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { deskDealsQuery } from '../api/desk-deals.ts';
import { DeskPage } from './desk-page.tsx';

type Contested = DeskDealsAnswer['contested'][number];
type Overdue = DeskDealsAnswer['overdue'][number];
type RowProps = { deal: Contested | Overdue; what: ReactNode; due: ReactNode };

function Row({ deal, what, due }: RowProps) {
  return (
    <li className="grid gap-x-6 gap-y-1 border-b border-rule py-3 md:grid-cols-[minmax(0,4fr)_minmax(0,4fr)_minmax(0,2fr)_minmax(0,4fr)]">
      <div>
        {deal.isOwn ? (
          <span className="font-medium">{deal.lotTitle}</span>
        ) : (
          <Link to={paths.deal(deal.code)} className="link inline-block py-0.5 font-medium">
            {deal.lotTitle}
          </Link>
        )}
        <div className="text-note text-ink-2">
          <span className="fig">{deal.code}</span>
          {deal.isOwn && '; your own deal, for a colleague'}
        </div>
      </div>
      <div>{what}</div>
      <div className="fig md:text-right">{formatMoney(deal.total)}</div>
      <div>{due}</div>
    </li>
  );
}

function ContestedRow({ deal }: { deal: Contested }) {
  return (
    <Row
      deal={deal}
      what={
        <>
          {deal.reason}
          <span className="block text-note text-ink-2">
            contested <Time at={deal.contestedAt} />
          </span>
        </>
      }
      due={
        <>
          <span className="text-ink-2">decide by </span>
          <Deadline at={deal.decideBy} />
        </>
      }
    />
  );
}

function OverdueRow({ deal }: { deal: Overdue }) {
  return (
    <Row
      deal={deal}
      what={
        <>
          Neither accepted nor contested
          <span className="block text-note text-ink-2">
            delivered <Time at={deal.deliveredAt} />
          </span>
        </>
      }
      due={
        <>
          <span className="text-ink-2">to be inspected by </span>
          <Time at={deal.inspectBy} />
        </>
      }
    />
  );
}

/** Deals that wait for a ruling or may be taken up; both is done on the deal's own page. */
export function ContestedPage() {
  const { data } = useSuspenseQuery(deskDealsQuery);
  return (
    <DeskPage title="Contested deals" sub="The money is held until the desk rules.">
      {data.contested.length === 0 ? (
        <EmptyState title="No deal is contested" />
      ) : (
        <ol className="border-t border-rule">
          {data.contested.map((deal) => (
            <ContestedRow key={deal.code} deal={deal} />
          ))}
        </ol>
      )}
      {data.overdue.length > 0 && (
        <section aria-labelledby="overdue-inspections" className="mt-10">
          <h2 id="overdue-inspections">Overdue inspections</h2>
          <p className="mb-3 max-w-prose text-ink-2">
            The buyer’s days to inspect are over without a word. The desk can take such a deal up and rule.
          </p>
          <ol className="border-t border-rule">
            {data.overdue.map((deal) => (
              <OverdueRow key={deal.code} deal={deal} />
            ))}
          </ol>
        </section>
      )}
    </DeskPage>
  );
}
