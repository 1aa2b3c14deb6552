import { FINENESS_UNIT_LABELS, isFinenessUnit } from '#shared/fineness.ts';
import { GRAMS_PER_UNIT, isMassUnit, MASS_UNIT_LABELS } from '#shared/mass.ts';
import { dec, plain } from '#shared/decimal.ts';
import { METAL_NAMES } from '#shared/metals.ts';
import type { ValuationBody } from '#shared/schemas/valuations.ts';
import { formatDecimal, formatMoney } from '../../lib/format.ts';
import type { Valuation } from './api/value-metal.ts';

type ValuedMetal = Valuation['metals'][number];

const wholes: Record<string, string> = { permille: '1000', karat: '24', percent: '100', gpt: '1,000,000' };

/** The working of one metal, step by step, as it could be done again by hand. */
export function workingOf(metal: ValuedMetal, body: ValuationBody): string[] {
  const content = body.contents.find((entry) => entry.metal === metal.metal);
  const { value, unit } = body.mass;
  if (!content || !isMassUnit(unit) || !isFinenessUnit(content.fineness.unit)) return [];
  const steps: string[] = [];
  const grams = unit === 'g' ? value : plain(dec(value).times(GRAMS_PER_UNIT[unit]));
  if (unit !== 'g')
    steps.push(
      `${formatDecimal(value)} ${MASS_UNIT_LABELS[unit]} × ${GRAMS_PER_UNIT[unit]} = ${formatDecimal(grams)} g`,
    );
  const fineness = content.fineness;
  const fraction =
    fineness.unit === 'karat'
      ? `${fineness.value} ÷ 24`
      : `${formatDecimal(fineness.value)} ÷ ${wholes[fineness.unit] ?? ''}`;
  steps.push(
    `${formatDecimal(grams)} g × ${fraction} = ${formatDecimal(metal.fineGrams)} g fine`,
    `${formatDecimal(metal.fineGrams)} g ÷ 31.1034768 = ${formatDecimal(metal.fineTroyOunces)} oz t fine`,
    `${formatDecimal(metal.fineTroyOunces)} oz t × ${formatMoney(metal.quote.usdPerTroyOunce)} = ${formatMoney(metal.value)}`,
    'Fine masses are rounded to six digits after the dot, the value once to the cent.',
  );
  return steps;
}

/** What an assumed value stands for, in the words of the form. */
export function assumedWhat(field: string, body: ValuationBody): string {
  if (field === '/readability') return 'How finely the balance reads';
  if (field.startsWith('/quotes/')) return 'The quote';
  const index = /^\/contents\/(\d+)\/uncertainty/.exec(field)?.[1];
  const metal = index && body.contents[Number.parseInt(index, 10)]?.metal;
  const name = metal && METAL_NAMES[metal as keyof typeof METAL_NAMES];
  return name ? `How sure the fineness of the ${name.toLowerCase()} is` : 'A value that was left out';
}

/** '585 ‰' as the reader wrote it. */
export function finenessAsTyped(metal: ValuedMetal, body: ValuationBody): string {
  const fineness = body.contents.find((entry) => entry.metal === metal.metal)?.fineness;
  if (!fineness || !isFinenessUnit(fineness.unit)) return '';
  return `${formatDecimal(fineness.value)} ${FINENESS_UNIT_LABELS[fineness.unit]}`;
}
