import { compareDecimals, dec, parseDecimal, plain } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { typedDecimal } from '#shared/typed-number.ts';
import { BOUND_FIELDS, type BoundField } from './register-filters.ts';

export type TypedBounds = Record<BoundField, string>;
export type BoundErrors = Partial<Record<BoundField, string>>;

const highest: Record<BoundField, string> = {
  finenessFrom: '1000',
  finenessTo: '1000',
  contentFrom: '100000000',
  contentTo: '100000000',
  percentFrom: '1000',
  percentTo: '1000',
};

const pairs: [from: BoundField, to: BoundField][] = [
  ['finenessFrom', 'finenessTo'],
  ['contentFrom', 'contentTo'],
  ['percentFrom', 'percentTo'],
];

/** Reads the bounds as typed, with dot or comma; what cannot be read, or crosses its partner, is told at its field. */
export function readBounds(typed: TypedBounds): { bounds: TypedBounds; errors: BoundErrors } {
  const bounds = { ...typed };
  const errors: BoundErrors = {};
  for (const field of BOUND_FIELDS) {
    if (typed[field].trim() === '') {
      bounds[field] = '';
      continue;
    }
    try {
      const text = typedDecimal(typed[field], field, '');
      bounds[field] = plain(parseDecimal(text, { field, maxDecimals: 6, min: '0', max: highest[field] }));
    } catch (error) {
      if (!(error instanceof MeasureError)) throw error;
      errors[field] = error.message;
    }
  }
  for (const [from, to] of pairs) {
    if (errors[from] || errors[to] || !bounds[from] || !bounds[to]) continue;
    if (compareDecimals(bounds[from], bounds[to]) > 0)
      errors[to] = `This is below the lower bound of ${plain(dec(bounds[from]))}.`;
  }
  return { bounds, errors };
}
