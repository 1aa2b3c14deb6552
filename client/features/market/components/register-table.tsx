import { Link } from 'react-router-dom';
import type { RegisterRow } from '#shared/schemas/lots.ts';
import { AskedPrice } from '../../../components/figures/asked-price.tsx';
import { Fineness } from '../../../components/figures/fineness.tsx';
import { Money } from '../../../components/figures/money.tsx';
import type { RuleWindow } from '../../../components/figures/melt-rule-geometry.ts';
import { formatZone } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { shownPermille } from '../../../lib/shown-figures.ts';
import { Closes, FineContent, GrossMass, LotThumb, RowFacts, RowRule } from './register-row-parts.tsx';

export type RegisterListProps = { rows: RegisterRow[]; quotedAt: string | null; window: RuleWindow };

const right = 'px-3 py-3 text-right font-normal';

/** The register as ruled columns, figures under figures. */
export function RegisterTable({ rows, quotedAt, window }: RegisterListProps) {
  const { timeZone } = useReader();
  return (
    <table className="w-full border-collapse border-t border-ink">
      <caption className="sr-only">Open lots of the register</caption>
      <thead>
        <tr className="border-b border-rule text-note text-ink-2">
          <th scope="col" className="py-3 pr-3 text-left font-normal" colSpan={2}>
            Lot
          </th>
          <th scope="col" className={right}>
            Gross
          </th>
          <th scope="col" className={right}>
            Fineness
          </th>
          <th scope="col" className={right}>
            Fine content
          </th>
          <th scope="col" className={right}>
            Melt now, US$
          </th>
          <th scope="col" className="w-56 px-3 py-3 text-left font-normal">
            On the melt rule
          </th>
          <th scope="col" className={right}>
            Price, US$
          </th>
          <th scope="col" className="py-3 pl-3 text-right font-normal">
            <span className="whitespace-nowrap">
              Closes, {formatZone(quotedAt ?? new Date().toISOString(), timeZone)}
            </span>
          </th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <TableRow key={row.code} row={row} quotedAt={quotedAt} window={window} />
        ))}
      </tbody>
    </table>
  );
}

type TableRowProps = { row: RegisterRow; quotedAt: string | null; window: RuleWindow };

function TableRow({ row, quotedAt, window }: TableRowProps) {
  return (
    <tr className="border-b border-rule">
      <td className="py-3 pr-3">
        <LotThumb row={row} />
      </td>
      <th scope="row" className="min-w-40 py-3 pr-3 text-left font-normal">
        <Link
          to={paths.lot(row.code)}
          data-lot={row.code}
          className="block py-0.5 font-semibold decoration-1 underline-offset-4 hover:underline"
        >
          {row.title}
        </Link>
        <span className="block text-note text-ink-2">
          <RowFacts row={row} />
        </span>
      </th>
      <td className={right}>
        <GrossMass row={row} />
      </td>
      <td className={right}>
        <Fineness
          permille={shownPermille(row.finenessPermille)}
          expanded={shownPermille(row.uncertaintyPermille)}
        />
      </td>
      <td className={right}>
        <FineContent row={row} />
        <span className="fig block text-note text-ink-2">{row.mainMetal}</span>
      </td>
      <td className={right}>
        {row.melt ? <Money bare value={row.melt.value} /> : <span className="text-ink-2">no quote</span>}
      </td>
      <td className="w-56 px-3 py-2">
        <RowRule row={row} quotedAt={quotedAt} window={window} />
      </td>
      <td className={right}>
        <AskedPrice row={row} bare />
        {row.settlesOn === 'final' && (
          <span className="block text-note text-ink-2">settles on final assay</span>
        )}
      </td>
      <td className="max-w-32 py-3 pl-3 text-right text-note text-ink-2">
        <Closes row={row} stacked />
      </td>
    </tr>
  );
}
