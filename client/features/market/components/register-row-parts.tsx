import { isMetal } from '#shared/metals.ts';
import type { RegisterRow } from '#shared/schemas/lots.ts';
import { MASS_UNIT_LABELS, type MassUnit } from '#shared/mass.ts';
import { formName, lotForms, type LotForm } from '../../../components/figures/lot-words.tsx';
import { Mass } from '../../../components/figures/mass.tsx';
import { MeltRule } from '../../../components/figures/melt-rule.tsx';
import type { MeltMark, RuleWindow } from '../../../components/figures/melt-rule-geometry.ts';
import { Quantity } from '../../../components/figures/quantity.tsx';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { formatLeft } from '../../../lib/format.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { shownFine } from '../../../lib/shown-figures.ts';
import { useNow } from '../../../lib/use-now.ts';

export function lotFormOf(form: string | null): LotForm {
  return lotForms.find((known) => known === form) ?? 'button';
}

type LotThumbProps = { row: Pick<RegisterRow, 'thumb' | 'form' | 'mainMetal'>; className?: string };

/** The first photo, or a drawing of the form; the words stand beside it, so it needs none. */
export function LotThumb({ row, className = 'size-13' }: LotThumbProps) {
  return (
    <span className={`sheet block shrink-0 overflow-hidden p-0.5 ${className}`}>
      {row.thumb ? (
        <img src={row.thumb} alt="" loading="lazy" className="size-full object-contain" />
      ) : (
        <SpecimenDrawing
          form={lotFormOf(row.form)}
          metal={isMetal(row.mainMetal) ? row.mainMetal : 'Au'}
          label={null}
          className="size-full"
        />
      )}
    </span>
  );
}

export function RowFacts({ row }: { row: RegisterRow }) {
  return (
    <>
      {formName(lotFormOf(row.form))} · {row.region} · {row.evidenceGrade}
      {row.isMine && <span className="text-lapis"> · yours</span>}
    </>
  );
}

export function GrossMass({ row }: { row: RegisterRow }) {
  return <Mass entry={{ value: row.gross.value, unit: row.gross.unit as MassUnit }} />;
}

/** The fine content of the main metal in the reader's unit, told no finer than the gross mass. */
export function FineContent({ row }: { row: RegisterRow }) {
  const { weightUnit } = useReader();
  const gross = { value: row.gross.value, unit: row.gross.unit as MassUnit };
  return <Quantity value={shownFine(row.fineGrams, gross, weightUnit)} unit={MASS_UNIT_LABELS[weightUnit]} />;
}

export function rowMarks(row: RegisterRow): MeltMark[] {
  if (row.percentOfMelt === null) return [];
  return [{ kind: row.linkedPercent === null ? 'price' : 'linked', percent: row.percentOfMelt }];
}

type RowRuleProps = { row: RegisterRow; quotedAt: string | null; window: RuleWindow };

export function RowRule({ row, quotedAt, window }: RowRuleProps) {
  return (
    <MeltRule
      size="row"
      window={window}
      band={row.melt && { low: row.melt.lowPercent, high: row.melt.highPercent }}
      marks={rowMarks(row)}
      quote={row.melt === null ? null : { at: quotedAt }}
    />
  );
}

/** What is left, and the moment; the head of the list names the zone. */
export function Closes({ row, stacked = false }: { row: RegisterRow; stacked?: boolean }) {
  const now = useNow(30_000);
  if (row.closesAt === null) return <>open</>;
  return (
    <>
      <span className="whitespace-nowrap text-ink">{formatLeft(row.closesAt, now) ?? 'just closed'}</span>
      {!stacked && ' · '}
      <span className={stacked ? 'block' : 'inline-block'}>
        <Time at={row.closesAt} show="short" />
      </span>
    </>
  );
}
