import { cut, plain, type Dec } from '../decimal.ts';
import { finenessText, type FinenessEntry } from '../fineness.ts';
import { GRAMS_PER_UNIT, massText } from '../mass.ts';
import { elementName } from '../metals.ts';
import { minorToAmount } from '../money.ts';
import { COVERAGE_FACTOR } from '../uncertainty.ts';
import type { LotMeasures } from './lot-measures.ts';
import type { MeltComputation, MetalFigure } from './melt.ts';

const SHOWN_DECIMALS = 12;

/** A number for a line of working: exact when short, else cut after twelve decimals and marked with an ellipsis. */
export function shown(value: Dec): string {
  if (value.decimalPlaces() <= SHOWN_DECIMALS) return plain(value);
  return `${cut(value, SHOWN_DECIMALS)}…`;
}

/** Working of the gross mass: the unit's factor and the balance. */
export function massWorking(measures: LotMeasures): string[] {
  const { gross, grossGrams, readability, massUncertaintyGrams } = measures;
  const lines: string[] = [];
  if (gross.unit !== 'g') {
    lines.push(`${massText(gross)} × ${GRAMS_PER_UNIT[gross.unit]} g = ${plain(grossGrams)} g, exact`);
  }
  lines.push(
    `Readability ${massText(readability)}; standard uncertainty of the mass ${shown(massUncertaintyGrams)} g`,
  );
  return lines;
}

/** Working of a metal line: fine grams, troy ounces with the weight step, amount. */
export function metalWorking(measures: LotMeasures, figure: MetalFigure): string[] {
  const { content, grams, troyOunces, troyOuncesText, roundedTroyOunces, quote, rate, amountMinor } = figure;
  const ouncesExact = roundedTroyOunces.eq(troyOunces);
  const product = roundedTroyOunces.times(rate);
  const amount = minorToAmount(amountMinor);
  return [
    `${plain(measures.grossGrams)} g × ${factorText(content.fineness)} = ${shown(grams)} g fine`,
    `${shown(grams)} g ÷ ${GRAMS_PER_UNIT.ozt} g/oz t = ${shown(troyOunces)} oz t` +
      (ouncesExact ? '' : `, rounded to ${troyOuncesText} oz t`),
    `${troyOuncesText} oz t × US$ ${quote.usdPerTroyOunce}/oz t = US$ ${shown(product)}` +
      (product.eq(amount) ? '' : `, rounded to US$ ${amount}`),
  ];
}

/** Working of the melt value: the sum of its lines and the band. */
export function meltWorking(melt: MeltComputation): string[] {
  const { value, low, high, expanded, expandedPercent, shares } = melt.figure;
  const sum = melt.metals.map(({ amountMinor }) => minorToAmount(amountMinor)).join(' + ');
  const parts = shares.map(({ input, percent }) => `${shareName(input)} ${percent} %`).join(', ');
  return [
    melt.metals.length > 1 ? `${sum} = US$ ${value}` : `The one metal line: US$ ${value}`,
    `Expanded uncertainty (k = ${plain(COVERAGE_FACTOR)}) US$ ${expanded}, ${expandedPercent} %: US$ ${low} to ${high}`,
    `Shares of the variance: ${parts}`,
  ];
}

/** Karat is written as the fraction that it is. */
function factorText(fineness: FinenessEntry): string {
  return fineness.unit === 'karat' ? `${fineness.value}/24` : finenessText(fineness);
}

function shareName(input: string): string {
  const symbol = input.split(':')[1];
  return symbol === undefined ? 'mass' : `assay of ${elementName(symbol as 'Au').toLowerCase()}`;
}
