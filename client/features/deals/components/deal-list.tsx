import { Link } from 'react-router-dom';
import type { DealRow } from '#shared/schemas/deals.ts';
import { lotForms, type LotForm } from '../../../components/figures/lot-words.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { Deadline, Time } from '../../../components/ui/time.tsx';
import { paths } from '../../../lib/paths.ts';
import { stateWord } from '../../../components/figures/deal-words.ts';

function formOf(form: string): LotForm {
  return lotForms.find((known) => known === form) ?? 'button';
}

function Thumb({ row }: { row: DealRow }) {
  const box = 'size-14 shrink-0 rounded-box border border-rule bg-sheet';
  if (row.thumb) return <img src={row.thumb} alt="" loading="lazy" className={`${box} object-cover`} />;
  return <SpecimenDrawing form={formOf(row.form)} label={null} className={`${box} p-1 text-ink-2`} />;
}

const whoNames: Record<NonNullable<DealRow['due']>['who'], string> = {
  buyer: 'Buyer',
  seller: 'Seller',
  desk: 'Desk',
  carrier: 'Carrier',
  provider: 'Payment provider',
};

function DueLine({ row }: { row: DealRow }) {
  if (row.due === null)
    return (
      <span className="text-ink-2">
        since <Time at={row.closedAt ?? row.updatedAt} />
      </span>
    );
  const { act, at, who, silence } = row.due;
  return (
    <>
      <span className={row.isMyTurn ? 'font-medium' : ''}>
        {!row.isMyTurn && `${whoNames[who]}: `}
        {act}
        {at && (
          <>
            {' '}
            by <Deadline at={at} />
          </>
        )}
      </span>
      <span className="block text-note text-ink-2">{silence}</span>
    </>
  );
}

function Row({ row }: { row: DealRow }) {
  return (
    <li className="grid gap-x-6 gap-y-2 border-b border-rule py-3.5 md:grid-cols-[minmax(0,5fr)_minmax(0,2fr)_minmax(0,6fr)]">
      <div className="flex gap-4">
        <Thumb row={row} />
        <div className="min-w-0">
          <Link
            to={paths.deal(row.code)}
            className="block py-0.5 font-semibold decoration-1 underline-offset-4 hover:underline"
          >
            {row.lotTitle}
          </Link>
          <span className="block text-note text-ink-2">
            <span className="fig">{row.code}</span> · you {row.side === 'buyer' ? 'buy' : 'sell'} ·{' '}
            {stateWord(row.state)}
          </span>
        </div>
      </div>
      <div className="md:text-right">
        <Money value={row.total.amount} />
      </div>
      <div>
        <DueLine row={row} />
      </div>
    </li>
  );
}

export function DealList({ rows }: { rows: DealRow[] }) {
  return (
    <ol>
      {rows.map((row) => (
        <Row key={row.code} row={row} />
      ))}
    </ol>
  );
}
