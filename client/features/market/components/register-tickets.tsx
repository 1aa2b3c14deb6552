import { Link } from 'react-router-dom';
import type { RegisterRow } from '#shared/schemas/lots.ts';
import { AskedPrice } from '../../../components/figures/asked-price.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { Quantity } from '../../../components/figures/quantity.tsx';
import { DataList } from '../../../components/ui/data-list.tsx';
import { formatDecimal, formatZone, THIN } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { shownPermille } from '../../../lib/shown-figures.ts';
import { Closes, FineContent, GrossMass, LotThumb, RowFacts, RowRule } from './register-row-parts.tsx';
import type { RegisterListProps } from './register-table.tsx';

/** The register where columns do not fit: each row a ticket with the same entries. */
export function RegisterTickets({ rows, quotedAt, window }: RegisterListProps) {
  const { timeZone } = useReader();
  const zone = formatZone(quotedAt ?? new Date().toISOString(), timeZone);
  return (
    <ul aria-label="Open lots of the register" className="grid gap-3 sm:grid-cols-2">
      {rows.map((row) => (
        <li key={row.code} className="sheet min-w-0 p-4">
          <div className="flex gap-3">
            <LotThumb row={row} />
            <div className="min-w-0">
              <h2 className="text-body">
                <Link
                  to={paths.lot(row.code)}
                  data-lot={row.code}
                  className="block py-0.5 font-semibold hover:underline"
                >
                  {row.title}
                </Link>
              </h2>
              <p className="text-note text-ink-2">
                <RowFacts row={row} />
              </p>
            </div>
          </div>
          <DataList className="mt-3 [&_dd]:text-right" rows={ticketRows(row, zone)} />
          <div className="mt-3 border-t border-dashed border-line pt-2">
            <RowRule row={row} quotedAt={quotedAt} window={window} />
          </div>
        </li>
      ))}
    </ul>
  );
}

function ticketRows(row: RegisterRow, zone: string) {
  return [
    { term: 'Price', data: <AskedPrice row={row} /> },
    {
      term: 'Melt now',
      data: row.melt ? <Money value={row.melt.value} /> : 'no quote',
    },
    { term: 'Gross', data: <GrossMass row={row} /> },
    {
      term: 'Fineness',
      data: (
        <>
          <Quantity value={shownPermille(row.finenessPermille)} unit="‰" />{' '}
          <span className="fig text-note text-ink-2">
            ±{THIN}
            {formatDecimal(shownPermille(row.uncertaintyPermille))}
          </span>
        </>
      ),
    },
    {
      term: `Fine ${row.mainMetal}`,
      data: <FineContent row={row} />,
    },
    { term: `Closes, ${zone}`, data: <Closes row={row} /> },
  ];
}
