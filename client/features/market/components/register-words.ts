import { METAL_NAMES } from '#shared/metals.ts';
import type { RegisterAnswer } from '#shared/schemas/lots.ts';
import { MASS_UNIT_LABELS } from '#shared/mass.ts';
import { formatDecimal } from '../../../lib/format.ts';
import { countryName } from '../../../lib/countries.ts';
import type { RegisterFilters, RegisterSort } from '../register-filters.ts';

export const sortNames: Record<RegisterSort, string> = {
  newest: 'newest',
  'percent-of-melt': 'lowest % of melt',
  'fine-content': 'most fine content',
};

/** '1 lot', '23 lots', 'more than 1,000 lots'. */
export function countText({ count, isCountCapped }: Pick<RegisterAnswer, 'count' | 'isCountCapped'>): string {
  if (isCountCapped) return `more than ${formatDecimal(count.toString())} lots`;
  return count === 1 ? '1 lot' : `${formatDecimal(count.toString())} lots`;
}

function rangeText(what: string, from: string, to: string, unit: string): string | null {
  if (from && to) return `${what} ${formatDecimal(from)} to ${formatDecimal(to)} ${unit}`;
  if (from) return `${what} from ${formatDecimal(from)} ${unit}`;
  if (to) return `${what} up to ${formatDecimal(to)} ${unit}`;
  return null;
}

/** What is chosen, in words: 'gold · button · fineness from 990 ‰'. */
export function filtersText(filters: RegisterFilters): string {
  const unit = MASS_UNIT_LABELS[filters.contentUnit ?? 'g'];
  return [
    filters.metal && METAL_NAMES[filters.metal].toLowerCase(),
    filters.form,
    filters.grade,
    rangeText('fineness', filters.finenessFrom, filters.finenessTo, '‰'),
    rangeText('fine content', filters.contentFrom, filters.contentTo, unit),
    rangeText('price', filters.percentFrom, filters.percentTo, '% of melt'),
    filters.destination && `ships to ${countryName(filters.destination)}`,
  ]
    .filter(Boolean)
    .join(' · ');
}
