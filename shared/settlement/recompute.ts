import { MeasureError } from '../domain-error.ts';
import { ENGINE_VERSIONS, refinedSheet } from './refined-sheet.ts';
import type { RefinedSheetInput, SettlementSheet } from './sheet-types.ts';

/** Outcome of recomputing a stored sheet: equal, or the JSON pointers at which the two differ. */
export type Recomputation = {
  readonly isEqual: boolean;
  readonly differences: readonly string[];
  readonly sheet: SettlementSheet;
};

/**
 * Computes a sheet again from its stored input and compares it with the stored sheet, value by value.
 * Throws MeasureError `engine-version-unknown` for a sheet of rules that are not kept here, and those of `refinedSheet`.
 */
export function recompute(input: RefinedSheetInput, stored: SettlementSheet): Recomputation {
  const version = ENGINE_VERSIONS.find((known) => known === stored.engineVersion);
  if (version === undefined) {
    throw new MeasureError('engine-version-unknown', '/engineVersion', 'These rules are not known here.');
  }
  const sheet = refinedSheet(input, version);
  const differences = differingPointers(sheet, stored, '');
  return { isEqual: differences.length === 0, differences, sheet };
}

/** JSON pointers at which two JSON values differ; empty when they are equal. Order of keys does not matter. */
export function differingPointers(left: unknown, right: unknown, pointer = ''): string[] {
  if (Object.is(left, right)) return [];
  if (!isContainer(left) || !isContainer(right) || Array.isArray(left) !== Array.isArray(right))
    return [pointer];
  const keys = new Set([...Object.keys(left), ...Object.keys(right)]);
  return [...keys].sort().flatMap((key) => differingPointers(left[key], right[key], `${pointer}/${key}`));
}

function isContainer(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}
