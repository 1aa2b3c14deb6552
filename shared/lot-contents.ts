import { isAssayMethodKey } from './assay/methods.ts';
import { invariant, IssueCollector, MeasureError } from './domain-error.ts';
import { isFinenessUnit, type FinenessEntry } from './fineness.ts';
import { isMassUnit, MASS_UNITS, type MassEntry } from './mass.ts';
import { isMetal, isOtherElement, type Metal, type OtherElement } from './metals.ts';
import type { DraftContent } from './schemas/lots.ts';
import type { ContentEntry } from './settlement/sheet-types.ts';
import { typedDecimal, typedNumber } from './typed-number.ts';

/** A value and its unit as typed. */
export type TypedQuantity = { value: string; unit: string };

/**
 * Reads a mass as typed: number and unit, both told about at once. Bounds are the engine's business (`toGrams`).
 * Throws MeasureError of `typedNumber`, `unit-missing`, `unit-unknown`.
 */
export function readMass(typed: TypedQuantity, field: string, missing: string): MassEntry {
  const issues = new IssueCollector();
  const value = issues.attempt(() => typedNumber(typed.value, `${field}/value`, missing));
  const unit = issues.attempt(() => {
    if (typed.unit === '') {
      throw new MeasureError('unit-missing', `${field}/unit`, 'Say in which unit the mass is.');
    }
    if (!isMassUnit(typed.unit)) {
      const known = MASS_UNITS.join(', ');
      throw new MeasureError('unit-unknown', `${field}/unit`, `Use one of the units ${known}.`);
    }
    return typed.unit;
  });
  issues.finish();
  invariant(value !== undefined && unit, 'what cannot be read is always reported');
  return { value, unit };
}

/**
 * Reads a fineness, or an uncertainty of one, as typed. Throws MeasureError of `typedDecimal`, `unit-missing`,
 * `unit-unknown`.
 */
export function readFineness(typed: TypedQuantity, field: string, missing: string): FinenessEntry {
  const issues = new IssueCollector();
  const value = issues.attempt(() => typedDecimal(typed.value, `${field}/value`, missing));
  const unit = issues.attempt(() => {
    if (typed.unit === '') {
      throw new MeasureError('unit-missing', `${field}/unit`, 'Say in which unit the fineness is.');
    }
    if (!isFinenessUnit(typed.unit)) {
      throw new MeasureError('unit-unknown', `${field}/unit`, 'Use ‰, karat, percent or g/t.');
    }
    return typed.unit;
  });
  issues.finish();
  invariant(value !== undefined && unit, 'what cannot be read is always reported');
  return { value, unit };
}

/** Reads an element's symbol. Throws MeasureError `metal-unknown` at `field`. */
export function readElement(symbol: string, field: string): Metal | OtherElement {
  if (isMetal(symbol) || isOtherElement(symbol)) return symbol;
  throw new MeasureError('metal-unknown', field, 'Choose a metal from the list.');
}

/** Reads one row of an assay as typed; every refusal is told at once. Bounds and totals are left to `measureLot`. */
export function readContent(row: DraftContent, field: string): ContentEntry {
  const issues = new IssueCollector();
  const metal = issues.attempt(() => readElement(row.metal, `${field}/metal`));
  const fineness = issues.attempt(() =>
    readFineness(row.fineness, `${field}/fineness`, 'Enter the fineness.'),
  );
  const uncertainty = issues.attempt(() => ({
    entry:
      row.uncertainty.value.trim() === ''
        ? null
        : readFineness(row.uncertainty, `${field}/uncertainty`, 'Enter the uncertainty.'),
  }));
  const method = row.method === '' ? 'none' : row.method;
  if (!isAssayMethodKey(method)) {
    issues.add('method-unknown', `${field}/method`, 'Choose one of the methods listed.');
  }
  issues.finish();
  invariant(metal && fineness && uncertainty, 'what cannot be read is always reported');
  return {
    metal,
    fineness,
    uncertainty: uncertainty.entry,
    method: isAssayMethodKey(method) ? method : 'none',
    paidFor: row.paidFor,
  };
}
