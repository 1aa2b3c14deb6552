import { Link } from 'react-router-dom';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { DataList } from '../../../components/ui/data-list.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { formatDate } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { CasePhotos } from './case-photos.tsx';

function History({ events }: { events: CaseAnswer['lot']['history'] }) {
  return (
    <ol className="flex flex-col gap-2">
      {events.map((event, index) => (
        <li key={`${event.at}:${index}`}>
          <Time at={event.at} />: {event.act.replaceAll('-', ' ')} by {event.who}
          {event.note && <div className="text-ink-2">{event.note}</div>}
        </li>
      ))}
    </ol>
  );
}

function Seller({ seller }: { seller: CaseAnswer['seller'] }) {
  const deals = seller.completedDeals === 1 ? '1 completed deal' : `${seller.completedDeals} completed deals`;
  return (
    <>
      {seller.displayName}, {seller.region}; {deals}
      {seller.suspendedAt && <strong className="text-litharge"> (suspended)</strong>}
      {'. '}
      <Link to={paths.deskMembers(seller.displayName)} className="link">
        See among members
      </Link>
    </>
  );
}

/** The lot behind the case, with its photos and its life so far. */
export function CaseLot({ view }: { view: CaseAnswer }) {
  const { lot, seller } = view;
  return (
    <section aria-labelledby="lot-heading" className="flex flex-col gap-4">
      <h2 id="lot-heading">The lot</h2>
      <DataList
        rows={[
          {
            term: 'Lot',
            data: (
              <Link to={paths.lot(lot.code)} className="link fig inline-block py-0.5">
                {lot.code}
              </Link>
            ),
          },
          { term: 'State', data: lot.state },
          { term: 'Seller', data: <Seller seller={seller} /> },
        ]}
      />
      {lot.description && <p className="max-w-prose whitespace-pre-line">{lot.description}</p>}
      <h3>Photos</h3>
      <CasePhotos photos={lot.photos} />
      <h3>History</h3>
      <History events={lot.history} />
    </section>
  );
}

/** Who decided, and on what. */
export function CaseDecision({ decision }: { decision: NonNullable<CaseAnswer['decision']> }) {
  const rows = [
    { term: 'Decided', data: <Time at={decision.at} /> },
    { term: 'By', data: decision.by },
    { term: 'Grade', data: decision.grade ?? 'none' },
    ...(decision.confirmedHow ? [{ term: 'Confirmed how', data: decision.confirmedHow }] : []),
    ...(decision.confirmedWith ? [{ term: 'Confirmed with', data: decision.confirmedWith }] : []),
    ...(decision.confirmedOn ? [{ term: 'Confirmed on', data: formatDate(decision.confirmedOn) }] : []),
    ...(decision.returnReason ? [{ term: 'Reason', data: decision.returnReason }] : []),
  ];
  return (
    <section aria-labelledby="decision-heading">
      <h2 id="decision-heading" className="mb-2">
        Decision
      </h2>
      <DataList rows={rows} />
    </section>
  );
}
