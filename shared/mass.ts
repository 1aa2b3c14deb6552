import { dec, fixed, parseDecimal, plain, type Dec } from './decimal.ts';
import { MeasureError } from './domain-error.ts';

/** Units of mass that are accepted, by the key used on the wire. `oz` and `lb` are avoirdupois, `ozt` is troy. */
export const MASS_UNITS = ['g', 'kg', 'mg', 'ozt', 'dwt', 'gr', 'lb', 'oz'] as const;

/** The wire key of a unit of mass. */
export type MassUnit = (typeof MASS_UNITS)[number];

/** A mass as entered: plain decimal text and its unit. */
export type MassEntry = { readonly value: string; readonly unit: MassUnit };

/** How a unit is written on a screen or sheet. */
export const MASS_UNIT_LABELS: Readonly<Record<MassUnit, string>> = {
  g: 'g',
  kg: 'kg',
  mg: 'mg',
  ozt: 'oz t',
  dwt: 'dwt',
  gr: 'gr',
  lb: 'lb',
  oz: 'oz av',
};

/**
 * Grams in one of each unit, exact. Anchor: the international pound of 0.453 592 37 kg and 7000 grains (1959 agreement;
 * NIST SP 811 App. B; NIST Handbook 44 App. C); troy ounce = 480 grains = 20 pennyweights.
 */
export const GRAMS_PER_UNIT: Readonly<Record<MassUnit, string>> = {
  g: '1',
  kg: '1000',
  mg: '0.001',
  ozt: '31.1034768',
  dwt: '1.55517384',
  gr: '0.06479891',
  lb: '453.59237',
  oz: '28.349523125',
};

/** Grams in one troy ounce, exact. */
export const GRAMS_PER_TROY_OUNCE: Dec = dec(GRAMS_PER_UNIT.ozt);

/** Digits after the dot that a mass may be entered with. */
export const MASS_MAX_DECIMALS = 6;

/** The largest mass taken: one tonne. */
export const MASS_MAX_GRAMS = '1000000';

/** Digits after the dot of the canonical gram value, which is stored as DECIMAL(30,15). Enough for every unit. */
export const CANONICAL_DECIMALS = 15;

/** True for a known unit key. */
export function isMassUnit(unit: unknown): unit is MassUnit {
  return (MASS_UNITS as readonly unknown[]).includes(unit);
}

/**
 * A mass as entered, in grams, exactly. `field` is the JSON pointer of the mass.
 * Throws MeasureError `unit-missing`, `unit-unknown`, `mass-too-large` and those of `parseDecimal`.
 */
export function toGrams(entry: MassEntry, field = ''): Dec {
  const unit: unknown = entry.unit;
  if (unit === undefined || unit === null || unit === '') {
    throw new MeasureError('unit-missing', `${field}/unit`, 'Say in which unit the mass is.');
  }
  if (!isMassUnit(unit)) {
    throw new MeasureError('unit-unknown', `${field}/unit`, `Use one of the units ${MASS_UNITS.join(', ')}.`);
  }
  const value = parseDecimal(entry.value, {
    field: `${field}/value`,
    maxDecimals: MASS_MAX_DECIMALS,
    above: '0',
  });
  const grams = value.times(GRAMS_PER_UNIT[unit]);
  if (grams.gt(MASS_MAX_GRAMS)) {
    throw new MeasureError('mass-too-large', `${field}/value`, 'A mass is at most 1000 kg.');
  }
  return grams;
}

/** Grams expressed in another unit, to 60 significant digits. */
export function fromGrams(grams: Dec, unit: MassUnit): Dec {
  return grams.div(GRAMS_PER_UNIT[unit]);
}

/** The canonical gram text with all 15 digits after the dot, as the DECIMAL(30,15) column answers it. */
export function canonicalGrams(entry: MassEntry, field = ''): string {
  return fixed(toGrams(entry, field), CANONICAL_DECIMALS);
}

/** Grams as plain text, without trailing zeros; with `places`, rounded half away from zero to that many digits. */
export function formatGrams(grams: Dec, places?: number): string {
  return places === undefined ? plain(grams) : fixed(grams, places);
}

/** A mass in words as printed: '12.34 g', '1 oz t'. */
export function massText(entry: MassEntry): string {
  return `${entry.value} ${MASS_UNIT_LABELS[entry.unit]}`;
}
