import { useSuspenseQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { DeskDealsAnswer } from '#shared/schemas/desk.ts';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { Deadline, Time } from '../../../components/ui/time.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { deskDealsQuery } from '../api/desk-deals.ts';
import { DeskPage } from './desk-page.tsx';

function Row({ deal }: { deal: DeskDealsAnswer['contested'][number] }) {
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
      <div>
        {deal.reason}
        <div className="text-note text-ink-2">
          contested <Time at={deal.contestedAt} />
        </div>
      </div>
      <div className="fig md:text-right">{formatMoney(deal.total)}</div>
      <div>
        <span className="text-ink-2">decide by </span>
        <Deadline at={deal.decideBy} />
      </div>
    </li>
  );
}

/** Deals that wait for a ruling; the ruling is given on the deal's own page. */
export function ContestedPage() {
  const { data } = useSuspenseQuery(deskDealsQuery);
  return (
    <DeskPage title="Contested deals" sub="The money is held until the desk rules.">
      {data.contested.length === 0 ? (
        <EmptyState title="No deal is contested" />
      ) : (
        <ol className="border-t border-rule">
          {data.contested.map((deal) => (
            <Row key={deal.code} deal={deal} />
          ))}
        </ol>
      )}
    </DeskPage>
  );
}
