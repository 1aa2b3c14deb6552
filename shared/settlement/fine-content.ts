import { fixed, type Dec } from '../decimal.ts';
import { fractionValue } from '../fineness.ts';
import { METALS, isMetal, type Metal } from '../metals.ts';
import { combine } from '../uncertainty.ts';
import { fineGrams, fineTroyOunces, measureLot, type LotEntry } from './lot-measures.ts';

/** Fine content of one metal with its expanded uncertainty (k = 2); needs no quote. All numbers are strings. */
export type FineContent = {
  readonly metal: Metal;
  readonly paidFor: boolean;
  readonly grams: string;
  readonly troyOunces: string;
  readonly expandedGrams: string;
};

const PLACES = 6;

/**
 * Fine content of the quoted metals of a lot, paid for or not, in the order Au Ag Pt Pd, shown to six decimals. For
 * screens that have no quote. Throws MeasureError of `measureLot`.
 */
export function fineContent(entry: LotEntry): FineContent[] {
  const measures = measureLot(entry);
  return METALS.flatMap((metal) => {
    const content = measures.contents.find((candidate) => candidate.metal === metal);
    if (!content || !isMetal(content.metal)) return [];
    const expanded: Dec = combine([
      {
        input: 'mass',
        sensitivity: fractionValue(content.fraction),
        standard: measures.massUncertaintyGrams,
      },
      { input: 'assay', sensitivity: measures.grossGrams, standard: content.standardUncertainty },
    ]).expanded;
    return [
      {
        metal,
        paidFor: content.paidFor,
        grams: fixed(fineGrams(measures.grossGrams, content.fraction), PLACES),
        troyOunces: fixed(fineTroyOunces(measures.grossGrams, content.fraction), PLACES),
        expandedGrams: fixed(expanded, PLACES),
      },
    ];
  });
}
