import { dec, fixed, type Dec } from './decimal.ts';
import type { EvidenceGrade } from './assay/evidence.ts';
import { MeasureError } from './domain-error.ts';
import { fractionValue } from './fineness.ts';
import { METALS, METAL_NAMES, type Metal } from './metals.ts';
import { combine } from './uncertainty.ts';
import { fineGrams, measureLot, type LotEntry, type LotMeasures } from './settlement/lot-measures.ts';
import { parseRate } from './settlement/rate.ts';

/** A day's first accepted rates, in US$ per troy ounce of fine metal. */
export type DayRates = Readonly<Partial<Record<Metal, string>>>;

/** What a lot is ranked by. Static: it changes with the lot or once a day, never with a quote. */
export type RankingKeys = {
  /** The paid metal with the greatest value at the day's rates. */
  readonly mainMetal: Metal;
  /** Fine grams of the main metal alone, six decimals. */
  readonly mainFineGrams: string;
  /** Main metal plus the other paid metals as main-metal grams at the day's rates, six decimals, at the end ranked by. */
  readonly equivalentGrams: string;
  /** US$ per equivalent gram, eight decimals; null without a price, or when the band reaches down to nothing. */
  readonly pricePerFineGram: string | null;
};

/** Input of `rankingKeys`: the lot as entered, its price in cents, its evidence grade and the day's rates. */
export type RankingInput = LotEntry & {
  readonly priceMinor: bigint | null;
  readonly grade: EvidenceGrade;
  readonly dayRates: DayRates;
};

/**
 * Static ranking keys. A certified lot ranks at its value; a declared or examined one at the lower end of its band
 * (value − expanded uncertainty, k = 2, never below zero), so that a boast is never rewarded.
 * Throws MeasureError of `measureLot`, `nothing-paid-for`, `quote-missing` at `/dayRates`, and those of `parseRate`.
 */
export function rankingKeys(input: RankingInput): RankingKeys {
  const measures = measureLot(input);
  const paid = paidMetals(measures, input.dayRates);
  const main = paid.reduce((best, next) =>
    next.grams.times(next.rate).gt(best.grams.times(best.rate)) ? next : best,
  );
  const full = paid.reduce((sum, { grams, rate }) => sum.plus(grams.times(rate).div(main.rate)), dec('0'));
  const equivalent = input.grade === 'certified' ? full : lowerEnd(measures, paid, main.rate, full);
  return {
    mainMetal: main.metal,
    mainFineGrams: fixed(main.grams, 6),
    equivalentGrams: fixed(equivalent, 6),
    pricePerFineGram: pricePerGram(input.priceMinor, equivalent),
  };
}

type PaidMetal = { metal: Metal; grams: Dec; rate: Dec; fraction: Dec; standard: Dec };

function paidMetals(measures: LotMeasures, dayRates: DayRates): [PaidMetal, ...PaidMetal[]] {
  const paid = METALS.flatMap((metal): PaidMetal[] => {
    const content = measures.contents.find((entry) => entry.metal === metal && entry.paidFor);
    if (!content) return [];
    const rate = dayRates[metal];
    if (rate === undefined) {
      const name = METAL_NAMES[metal].toLowerCase();
      throw new MeasureError(
        'quote-missing',
        `/dayRates/${metal}`,
        `There is no rate of the day for ${name}.`,
      );
    }
    return [
      {
        metal,
        grams: fineGrams(measures.grossGrams, content.fraction),
        rate: parseRate(rate, `/dayRates/${metal}`),
        fraction: fractionValue(content.fraction),
        standard: content.standardUncertainty,
      },
    ];
  });
  const [first, ...rest] = paid;
  if (!first)
    throw new MeasureError('nothing-paid-for', '/contents', 'At least one metal has to be paid for.');
  return [first, ...rest];
}

/** Lower end of the band of the equivalent grams E = m·Σ(w·p/p_main); the mass enters every metal. */
function lowerEnd(measures: LotMeasures, paid: readonly PaidMetal[], mainRate: Dec, full: Dec): Dec {
  const { expanded } = combine([
    {
      input: 'mass',
      sensitivity: paid.reduce(
        (sum, { fraction, rate }) => sum.plus(fraction.times(rate).div(mainRate)),
        dec('0'),
      ),
      standard: measures.massUncertaintyGrams,
    },
    ...paid.map(({ metal, rate, standard }) => ({
      input: metal,
      sensitivity: measures.grossGrams.times(rate).div(mainRate),
      standard,
    })),
  ]);
  const low = full.minus(expanded);
  return low.gt(0) ? low : dec('0');
}

function pricePerGram(priceMinor: bigint | null, grams: Dec): string | null {
  if (priceMinor === null || !grams.gt(0)) return null;
  return fixed(dec(priceMinor).div(100).div(grams), 8);
}
