import type { UseQueryResult } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { RegisterAnswer, RegisterRow } from '#shared/schemas/lots.ts';
import { AskedPrice } from '../../../components/figures/asked-price.tsx';
import { Fineness } from '../../../components/figures/fineness.tsx';
import { formName, lotForms } from '../../../components/figures/lot-words.tsx';
import { MeltRule } from '../../../components/figures/melt-rule.tsx';
import { QuoteStateNotice } from '../../../components/figures/quote-state-notice.tsx';
import { Quantity } from '../../../components/figures/quantity.tsx';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { paths } from '../../../lib/paths.ts';

/** Spelt here because the module of masses brings the arithmetic along, which the first page does without. */
const unitLabels: Readonly<Record<string, string>> = { ozt: 'oz t', oz: 'oz av' };

function formOf(form: string) {
  return lotForms.find((known) => known === form) ?? 'button';
}

function Thumb({ row }: { row: RegisterRow }) {
  const box = 'size-16 shrink-0 rounded-box border border-rule bg-sheet';
  if (row.thumb)
    return <img src={row.thumb} alt="" width={64} height={64} className={`${box} object-cover`} />;
  return (
    <SpecimenDrawing
      form={formOf(row.form)}
      metal={row.mainMetal}
      label={null}
      className={`${box} p-1 text-ink-2`}
    />
  );
}

function tidyPermille(permille: string): string {
  return permille.replace(/(\.\d{2})\d+$/, '$1');
}

type LineProps = { row: RegisterRow; quotedAt: string | null };

function Line({ row, quotedAt }: LineProps) {
  const { melt, percentOfMelt } = row;
  return (
    <li className="grid grid-cols-2 gap-x-6 gap-y-2 border-b border-rule py-4 lg:grid-cols-[minmax(0,7fr)_minmax(0,3fr)_minmax(0,4fr)_minmax(0,5fr)_minmax(0,3fr)]">
      <div className="col-span-2 flex gap-4 lg:col-span-1">
        <Thumb row={row} />
        <div className="min-w-0">
          <Link
            to={paths.lot(row.code)}
            className="block py-0.5 font-semibold decoration-1 underline-offset-4 hover:underline"
          >
            {row.title}
          </Link>
          <span className="block text-note text-ink-2">
            {formName(formOf(row.form))} · {row.region} · {row.evidenceGrade}
          </span>
        </div>
      </div>
      <div>
        <span className="block text-note text-ink-2">gross</span>
        <Quantity value={row.gross.value} unit={unitLabels[row.gross.unit] ?? row.gross.unit} />
      </div>
      <div>
        <span className="block text-note text-ink-2">fineness, {row.mainMetal}</span>
        <Fineness
          permille={tidyPermille(row.finenessPermille)}
          expanded={tidyPermille(row.uncertaintyPermille)}
        />
      </div>
      <div className="col-span-2 min-w-0 sm:col-span-1">
        <MeltRule
          size="row"
          band={melt && { low: melt.lowPercent, high: melt.highPercent }}
          marks={
            percentOfMelt ? [{ kind: row.linkedPercent ? 'linked' : 'price', percent: percentOfMelt }] : []
          }
          quote={melt && quotedAt ? { at: quotedAt } : null}
        />
      </div>
      <div className="lg:text-right">
        <span className="block text-note text-ink-2">price</span>
        <AskedPrice row={row} />
      </div>
    </li>
  );
}

/** The newest lines of the register as they stand there. */
export function NewestLots({ lots }: { lots: UseQueryResult<RegisterAnswer> }) {
  if (lots.isPending) return <Skeleton lines={5} label="Loading the newest lots" />;
  if (lots.isError && !lots.data)
    return <ErrorState error={lots.error} what="The register" onRetry={() => void lots.refetch()} />;
  const { rows, quotedAt, quoteState } = lots.data;
  if (rows.length === 0)
    return (
      <EmptyState title="No lot is open today" drawing={<SpecimenDrawing form="grain" label={null} />}>
        The register fills as sellers list what they refined and the desk confirms it.
      </EmptyState>
    );
  return (
    <>
      <QuoteStateNotice state={quoteState} at={quotedAt} className="mb-4" />
      <ul className="border-t border-ink">
        {rows.map((row) => (
          <Line key={row.code} row={row} quotedAt={quotedAt} />
        ))}
      </ul>
    </>
  );
}
