import { dec, fixed, parseDecimal, roundToStep, type Dec } from '../decimal.ts';
import { IssueCollector, MeasureError, invariant } from '../domain-error.ts';
import { fractionValue } from '../fineness.ts';
import { GRAMS_PER_TROY_OUNCE } from '../mass.ts';
import { METALS, isMetal, type Metal } from '../metals.ts';
import { minorToAmount, roundToMinor } from '../money.ts';
import { combine } from '../uncertainty.ts';
import type { UncertainInput } from '../uncertainty.ts';
import { fineGrams, fineTroyOunces, type LotMeasures, type MeasuredContent } from './lot-measures.ts';
import { assertQuotesDistinct, quoteOf } from './rate.ts';
import type { MeltFigure, QuoteRef, ShareInput } from './sheet-types.ts';

/** Weight step that a metal's payable mass is rounded to unless the terms name another, in troy ounces. */
export const DEFAULT_WEIGHT_STEP = '0.000001';

/** One metal paid for: its exact fine mass, the mass after the weight step, and its amount in cents. */
export type MetalFigure = {
  readonly metal: Metal;
  readonly content: MeasuredContent;
  readonly quote: QuoteRef;
  readonly rate: Dec;
  readonly grams: Dec;
  readonly troyOunces: Dec;
  readonly roundedTroyOunces: Dec;
  /** The rounded mass as printed, with the digits of the step. */
  readonly troyOuncesText: string;
  readonly amountMinor: bigint;
};

/** The melt value of a lot: its metal lines in the order Au Ag Pt Pd, their sum, and the band around it. */
export type MeltComputation = {
  readonly metals: readonly MetalFigure[];
  readonly valueMinor: bigint;
  readonly figure: MeltFigure;
};

/** Reads a weight step in troy ounces. Throws MeasureError of `parseDecimal` at `/weightStep`. */
export function parseWeightStep(text: string): Dec {
  return parseDecimal(text, { field: '/weightStep', maxDecimals: 9, above: '0', max: '1' });
}

/**
 * Melt value of the metals paid for. Each metal: exact fine mass, rounded half away from zero to the weight step,
 * × rate, rounded once to the cent; the value is the sum of those lines.
 *
 * Band: GUM 5.1.2 on V = m·Σ(w·p) with the mass as one input that enters every metal and each assay as its own; the
 * expanded uncertainty (k = 2) is rounded once to the cent; low and high are value ∓ expanded, low never below zero.
 * Throws MeasureError `nothing-paid-for`, `quote-missing`, `quote-repeated` and those of `parseRate`.
 */
export function computeMelt(
  measures: LotMeasures,
  quotes: readonly QuoteRef[],
  weightStep: string = DEFAULT_WEIGHT_STEP,
): MeltComputation {
  assertQuotesDistinct(quotes);
  const step = parseWeightStep(weightStep);
  const paid = METALS.flatMap((metal) => {
    const content = measures.contents.find((entry) => entry.metal === metal && entry.paidFor);
    return content ? [{ metal, content }] : [];
  });
  if (paid.length === 0) {
    throw new MeasureError('nothing-paid-for', '/contents', 'At least one metal has to be paid for.');
  }
  const issues = new IssueCollector();
  const metals = paid.flatMap(({ metal, content }) => {
    const figure = issues.attempt(() => metalFigure(measures, metal, content, quotes, step));
    return figure ? [figure] : [];
  });
  issues.finish();
  const valueMinor = metals.reduce((sum, { amountMinor }) => sum + amountMinor, 0n);
  return { metals, valueMinor, figure: meltFigure(measures, metals, valueMinor) };
}

function metalFigure(
  measures: LotMeasures,
  metal: Metal,
  content: MeasuredContent,
  quotes: readonly QuoteRef[],
  step: Dec,
): MetalFigure {
  invariant(isMetal(content.metal), 'only a quoted metal is paid for');
  const { quote, rate } = quoteOf(quotes, metal);
  const troyOunces = fineTroyOunces(measures.grossGrams, content.fraction);
  const roundedTroyOunces = roundToStep(troyOunces, step);
  return {
    metal,
    content,
    quote,
    rate,
    grams: fineGrams(measures.grossGrams, content.fraction),
    troyOunces,
    roundedTroyOunces,
    troyOuncesText: fixed(roundedTroyOunces, step.decimalPlaces()),
    amountMinor: roundToMinor(roundedTroyOunces.times(rate)),
  };
}

/** Inputs of the band: the mass moves every metal at once, each assay only its own. */
function bandInputs(measures: LotMeasures, metals: readonly MetalFigure[]): UncertainInput<ShareInput>[] {
  const usdPerGramOfLot = metals.reduce(
    (sum, { content, rate }) =>
      sum.plus(fractionValue(content.fraction).times(rate).div(GRAMS_PER_TROY_OUNCE)),
    dec('0'),
  );
  return [
    { input: 'mass', sensitivity: usdPerGramOfLot, standard: measures.massUncertaintyGrams },
    ...metals.map(({ metal, content, rate }) => ({
      input: `assay:${metal}` as const,
      sensitivity: measures.grossGrams.times(rate).div(GRAMS_PER_TROY_OUNCE),
      standard: content.standardUncertainty,
    })),
  ];
}

function meltFigure(measures: LotMeasures, metals: readonly MetalFigure[], valueMinor: bigint): MeltFigure {
  const { expanded, shares } = combine(bandInputs(measures, metals));
  const expandedMinor = roundToMinor(expanded);
  const lowMinor = valueMinor > expandedMinor ? valueMinor - expandedMinor : 0n;
  return {
    value: minorToAmount(valueMinor),
    low: minorToAmount(lowMinor),
    high: minorToAmount(valueMinor + expandedMinor),
    expanded: minorToAmount(expandedMinor),
    expandedPercent: relativePercent(expandedMinor, valueMinor),
    shares,
  };
}

function relativePercent(partMinor: bigint, wholeMinor: bigint): string {
  return wholeMinor === 0n ? '0.00' : fixed(dec(partMinor).times(100).div(dec(wholeMinor)), 2);
}
