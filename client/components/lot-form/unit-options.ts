import { ASSAY_METHOD_KEYS, ASSAY_METHODS } from '#shared/assay/methods.ts';
import { FINENESS_UNIT_LABELS, FINENESS_UNITS } from '#shared/fineness.ts';
import { MASS_UNIT_LABELS, MASS_UNITS } from '#shared/mass.ts';
import { elementName, METALS, OTHER_ELEMENTS, type Metal, type OtherElement } from '#shared/metals.ts';

export const massUnits = MASS_UNITS.map((value) => ({ value, label: MASS_UNIT_LABELS[value] }));
export const finenessUnits = FINENESS_UNITS.map((value) => ({ value, label: FINENESS_UNIT_LABELS[value] }));

const nameOf = (symbol: Metal | OtherElement) => ({
  value: symbol,
  label: `${elementName(symbol)} (${symbol})`,
});
export const metalOptions = METALS.map(nameOf);
export const elementOptions = OTHER_ELEMENTS.map(nameOf);

export const methodOptions = ASSAY_METHOD_KEYS.filter((key) => key !== 'none').map((key) => ({
  value: key as string,
  label: ASSAY_METHODS[key].name,
}));
