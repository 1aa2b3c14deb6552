import { Link } from 'react-router-dom';
import type { QueueRow } from '#shared/schemas/desk.ts';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { Age, Time } from '../../../components/ui/time.tsx';
import { paths } from '../../../lib/paths.ts';

const STATE_WORDS: Record<QueueRow['state'], string> = {
  submitted: 'waiting',
  claimed: 'claimed',
  verified: 'verified',
  examined: 'examined',
  returned: 'returned',
  superseded: 'superseded',
};

function stampTone(state: QueueRow['state']): 'good' | 'plain' | 'attention' {
  if (state === 'verified') return 'good';
  return state === 'returned' ? 'attention' : 'plain';
}

function Holder({ row }: { row: QueueRow }) {
  if (row.state !== 'claimed') return null;
  return (
    <span className="text-note text-ink-2">
      {row.isMine ? 'by you' : `by ${row.claimedBy ?? 'a colleague'}`}
    </span>
  );
}

function Row({ row, isWaiting }: { row: QueueRow; isWaiting: boolean }) {
  const isOwn = !row.can.open;
  return (
    <li className="grid gap-x-6 gap-y-1 border-b border-rule py-3 md:grid-cols-[minmax(0,5fr)_minmax(0,4fr)_minmax(0,3fr)_minmax(0,3fr)]">
      <div>
        {isOwn ? (
          <span className="font-medium">{row.lotTitle}</span>
        ) : (
          <Link to={paths.deskCase(row.id)} className="link inline-block py-0.5 font-medium">
            {row.lotTitle}
          </Link>
        )}
        <div className="text-note text-ink-2">
          <span className="fig">{row.lotCode}</span>, {row.form}
          {isOwn && '; your own lot, for a colleague'}
        </div>
      </div>
      <div>
        {row.laboratoryName}
        <div className="text-note text-ink-2">
          report <span className="fig">{row.number}</span>
        </div>
      </div>
      <div>
        <span className="sr-only">handed in </span>
        <Time at={row.submittedAt} />
        {isWaiting && (
          <div className="text-note text-ink-2">
            <Age at={row.submittedAt} everyMs={60_000} /> ago
          </div>
        )}
      </div>
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
        <Stamp tone={stampTone(row.state)}>{STATE_WORDS[row.state]}</Stamp>
        <Holder row={row} />
        {row.flags > 0 && (
          <span className="text-note font-semibold text-litharge">
            {row.flags === 1 ? '1 flag' : `${row.flags} flags`}
          </span>
        )}
      </div>
    </li>
  );
}

/** Certificates one under the other; on a narrow screen each becomes a ticket. */
export function QueueList({ rows, isWaiting }: { rows: readonly QueueRow[]; isWaiting: boolean }) {
  return (
    <ol className="border-t border-rule">
      {rows.map((row) => (
        <Row key={row.id} row={row} isWaiting={isWaiting} />
      ))}
    </ol>
  );
}
