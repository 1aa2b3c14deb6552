import type { Dec } from './decimal.ts';
import { roundDownToStandard } from './fineness.ts';
import type { Metal } from './metals.ts';

/**
 * Standards of fineness in ‰ by metal. `hallmark`: Hallmarking Act 1973 (UK) s.2 with its orders; `iso`: ISO 9202:2014
 * Table 1. Both from memory. A mark is a minimum without a minus tolerance (ISO 9202, catalogue text).
 */
export const FINENESS_STANDARDS = {
  hallmark: {
    Au: ['375', '585', '750', '916', '990', '999'],
    Ag: ['800', '925', '958', '999'],
    Pt: ['850', '900', '950', '999'],
    Pd: ['500', '950', '999'],
  },
  iso: {
    Au: ['333', '375', '417', '585', '750', '800', '916', '990', '999'],
    Ag: ['800', '830', '835', '925', '958', '999'],
    Pt: ['500', '600', '850', '900', '950', '999'],
    Pd: ['500', '950', '999'],
  },
} as const satisfies Record<string, Record<Metal, readonly string[]>>;

/** A named list of standards. */
export type StandardList = keyof typeof FINENESS_STANDARDS;

/** The highest standard that a fineness in ‰ reaches: 588 gives 585, 584 gives 375; null when it reaches none. */
export function markOfFineness(metal: Metal, permille: Dec, list: StandardList = 'hallmark'): string | null {
  return roundDownToStandard(permille, FINENESS_STANDARDS[list][metal]);
}
