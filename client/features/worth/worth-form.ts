import { MeasureError } from '#shared/domain-error.ts';
import type { FinenessUnit } from '#shared/fineness.ts';
import type { MassUnit } from '#shared/mass.ts';
import { METALS, type Metal } from '#shared/metals.ts';
import { parseMassText } from '#shared/parse-mass-text.ts';
import type { ValuationBody } from '#shared/schemas/valuations.ts';
import { typedDecimal } from '#shared/typed-number.ts';
import type { FieldProblem } from '../../lib/api-client.ts';

export type WorthRow = {
  id: number;
  metal: Metal;
  fineness: string;
  finenessUnit: FinenessUnit;
  uncertainty: string;
  /** Null while the accepted quote is taken; text once the reader writes a quote of their own. */
  quote: string | null;
};

export type WorthForm = {
  mass: string;
  massUnit: MassUnit;
  readability: string;
  rows: WorthRow[];
};

export function blankRow(id: number, metal: Metal): WorthRow {
  return { id, metal, fineness: '', finenessUnit: 'permille', uncertainty: '', quote: null };
}

export function blankWorth(massUnit: MassUnit): WorthForm {
  return { mass: '', massUnit, readability: '', rows: [blankRow(1, 'Au')] };
}

export function isWorthForm(value: unknown): value is WorthForm {
  if (typeof value !== 'object' || value === null) return false;
  const form = value as Partial<WorthForm>;
  return (
    typeof form.mass === 'string' &&
    typeof form.massUnit === 'string' &&
    typeof form.readability === 'string' &&
    Array.isArray(form.rows) &&
    form.rows.length > 0 &&
    form.rows.every((row) => typeof row?.fineness === 'string' && METALS.includes(row.metal))
  );
}

/** The first metal that no row has yet. */
export function nextMetal(rows: readonly WorthRow[]): Metal | null {
  return METALS.find((metal) => rows.every((row) => row.metal !== metal)) ?? null;
}

/** A karat says too little for an uncertainty: beside it stand parts per thousand. */
export function uncertaintyUnit(row: Pick<WorthRow, 'finenessUnit'>): FinenessUnit {
  return row.finenessUnit === 'karat' ? 'permille' : row.finenessUnit;
}

/** Ids of the fields as they stand in the page. */
export const fieldIds = {
  mass: 'worth-mass',
  massUnit: 'worth-mass-unit',
  readability: 'worth-readability',
  metal: (row: WorthRow) => `worth-metal-${row.id}`,
  fineness: (row: WorthRow) => `worth-fineness-${row.id}`,
  finenessUnit: (row: WorthRow) => `worth-fineness-unit-${row.id}`,
  uncertainty: (row: WorthRow) => `worth-uncertainty-${row.id}`,
  quote: (row: WorthRow) => `worth-quote-${row.id}`,
};

export type WorthErrors = Record<string, string>;

/** Reads what was typed, with dot or comma; what is missing or could be read in two ways is told at its field. */
export function readWorth(form: WorthForm): { body: ValuationBody; errors: WorthErrors } {
  const errors: WorthErrors = {};
  const read = (id: string, step: () => string): string => {
    try {
      return step();
    } catch (error) {
      if (!(error instanceof MeasureError)) throw error;
      errors[id] = error.message;
      return '';
    }
  };
  const isGiven = (text: string) => text.trim() !== '';
  const mass = read(fieldIds.mass, () => massOrMinus(form.mass));
  const readability = isGiven(form.readability)
    ? { value: read(fieldIds.readability, () => parseMassText(form.readability)), unit: form.massUnit }
    : null;
  const quotes: NonNullable<ValuationBody['quotes']> = {};
  const contents = form.rows.map((row) => {
    const fineness = read(fieldIds.fineness(row), () =>
      typedDecimal(row.fineness, '', 'Write the fineness, such as 585 ‰ or 14 karat.'),
    );
    const uncertainty = isGiven(row.uncertainty)
      ? {
          value: read(fieldIds.uncertainty(row), () => typedDecimal(row.uncertainty, '', '')),
          unit: uncertaintyUnit(row),
        }
      : null;
    const own = row.quote;
    if (own !== null && isGiven(own))
      quotes[row.metal] = read(fieldIds.quote(row), () => typedDecimal(own, '', ''));
    return { metal: row.metal, fineness: { value: fineness, unit: row.finenessUnit }, uncertainty };
  });
  return {
    body: { mass: { value: mass, unit: form.massUnit }, readability, contents, quotes },
    errors,
  };
}

/** A minus is kept, so that the answer says what is wrong with it rather than that it cannot be read. */
function massOrMinus(text: string): string {
  const minus = /^\s*[-−]\s*(.+)$/u.exec(text);
  return minus ? `-${parseMassText(minus[1] ?? '')}` : parseMassText(text);
}

/** Where a refusal of the server stands in the page; null for what belongs to no single field. */
export function fieldIdOfPointer(pointer: string, form: WorthForm): string | null {
  const content = /^\/contents\/(\d+)(?:\/(\w+))?(?:\/(\w+))?/.exec(pointer);
  const row = content && form.rows[Number.parseInt(content[1] ?? '', 10)];
  if (row) {
    if (content[2] === 'metal') return fieldIds.metal(row);
    if (content[2] === 'uncertainty') return fieldIds.uncertainty(row);
    return content[3] === 'unit' ? fieldIds.finenessUnit(row) : fieldIds.fineness(row);
  }
  const metal = /^\/quotes\/(\w+)/.exec(pointer)?.[1];
  const quoted = form.rows.find((entry) => entry.metal === metal);
  if (quoted) return fieldIds.quote(quoted);
  if (pointer === '/mass/unit') return fieldIds.massUnit;
  if (pointer.startsWith('/mass')) return fieldIds.mass;
  return pointer.startsWith('/readability') ? fieldIds.readability : null;
}

/** Refusals of the server by field; those of no field are answered apart. */
export function errorsOfProblems(problems: readonly FieldProblem[], form: WorthForm) {
  const errors: WorthErrors = {};
  const general: string[] = [];
  for (const { pointer, message } of problems) {
    const id = fieldIdOfPointer(pointer, form);
    if (id === null) general.push(message);
    else errors[id] ??= message;
  }
  return { errors, general };
}
