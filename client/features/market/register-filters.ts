import { dec, plain } from '#shared/decimal.ts';
import { GRAMS_PER_UNIT } from '#shared/mass.ts';
import { READING_UNITS, type ReadingUnit } from '#shared/mass-in-units.ts';
import { METALS, type Metal } from '#shared/metals.ts';

export const FORMS = ['button', 'bar', 'grain'] as const;
export const GRADES = ['certified', 'examined', 'declared'] as const;
export const SORTS = ['newest', 'percent-of-melt', 'fine-content'] as const;
export type RegisterForm = (typeof FORMS)[number];
export type RegisterGrade = (typeof GRADES)[number];
export type RegisterSort = (typeof SORTS)[number];

/** What narrows and orders the register. Bounds are plain decimal text; the content carries the unit it was typed in. */
export type RegisterFilters = {
  metal: Metal | null;
  form: RegisterForm | null;
  grade: RegisterGrade | null;
  finenessFrom: string;
  finenessTo: string;
  contentFrom: string;
  contentTo: string;
  contentUnit: ReadingUnit | null;
  percentFrom: string;
  percentTo: string;
  destination: string;
  sort: RegisterSort;
};

/** The bounds, each with its name in the address. */
export const BOUND_NAMES = {
  finenessFrom: 'fineness-from',
  finenessTo: 'fineness-to',
  contentFrom: 'content-from',
  contentTo: 'content-to',
  percentFrom: 'melt-from',
  percentTo: 'melt-to',
} as const;
export type BoundField = keyof typeof BOUND_NAMES;
export const BOUND_FIELDS = Object.keys(BOUND_NAMES) as BoundField[];

const PAGES_MAX = 20;
const BOUND = /^(?:0|[1-9]\d{0,8})(?:\.\d{1,6})?$/;

function oneOf<T extends string>(values: readonly T[], text: string | null): T | null {
  return values.find((value) => value === text) ?? null;
}

/** Reads the address; whatever is not a filter of ours counts as not there. */
export function filtersFromSearch(search: URLSearchParams): RegisterFilters {
  const bound = (field: BoundField) => {
    const text = search.get(BOUND_NAMES[field]) ?? '';
    return BOUND.test(text) ? text : '';
  };
  const destination = search.get('to') ?? '';
  const filters: RegisterFilters = {
    metal: oneOf(METALS, search.get('metal')),
    form: oneOf(FORMS, search.get('form')),
    grade: oneOf(GRADES, search.get('grade')),
    finenessFrom: bound('finenessFrom'),
    finenessTo: bound('finenessTo'),
    contentFrom: bound('contentFrom'),
    contentTo: bound('contentTo'),
    contentUnit: oneOf(READING_UNITS, search.get('content-unit')),
    percentFrom: bound('percentFrom'),
    percentTo: bound('percentTo'),
    destination: /^[A-Z]{2}$/.test(destination) ? destination : '',
    sort: oneOf(SORTS, search.get('sort')) ?? 'newest',
  };
  const hasContent = filters.contentFrom !== '' || filters.contentTo !== '';
  return { ...filters, contentUnit: hasContent ? (filters.contentUnit ?? 'g') : null };
}

/** Writes the address: only what differs from the plain register, always in the same order. */
export function searchFromFilters(filters: RegisterFilters): URLSearchParams {
  const search = new URLSearchParams();
  const put = (name: string, value: string | null) => value && search.set(name, value);
  put('metal', filters.metal);
  put('form', filters.form);
  put('grade', filters.grade);
  for (const field of BOUND_FIELDS) put(BOUND_NAMES[field], filters[field]);
  if (filters.contentFrom || filters.contentTo) put('content-unit', filters.contentUnit ?? 'g');
  put('to', filters.destination);
  if (filters.sort !== 'newest') put('sort', filters.sort);
  return search;
}

/** How many pages of the list the address asks for; 1 unless it says more. */
export function pagesFromSearch(search: URLSearchParams): number {
  const text = search.get('pages') ?? '';
  return /^[1-9]\d?$/.test(text) ? Math.min(PAGES_MAX, Number.parseInt(text, 10)) : 1;
}

export function registerHref(filters: RegisterFilters): string {
  const search = searchFromFilters(filters).toString();
  return search === '' ? '/lots' : `/lots?${search}`;
}

/** What the API is asked for: contents in grams, exactly. */
export function apiSearchOf(filters: RegisterFilters): URLSearchParams {
  const search = new URLSearchParams({ sort: filters.sort });
  const put = (name: string, value: string | null) => value && search.set(name, value);
  const inGrams = (value: string) =>
    value && plain(dec(value).times(GRAMS_PER_UNIT[filters.contentUnit ?? 'g']));
  put('metal', filters.metal);
  put('form', filters.form);
  put('grade', filters.grade);
  put('finenessMin', filters.finenessFrom);
  put('finenessMax', filters.finenessTo);
  put('fineGramsMin', inGrams(filters.contentFrom));
  put('fineGramsMax', inGrams(filters.contentTo));
  put('percentMin', filters.percentFrom);
  put('percentMax', filters.percentTo);
  put('destination', filters.destination);
  return search;
}

/** Whether anything but the order is chosen. */
export function isNarrowed(filters: RegisterFilters): boolean {
  return searchFromFilters({ ...filters, sort: 'newest' }).toString() !== '';
}

export const plainFilters = (sort: RegisterSort = 'newest'): RegisterFilters => ({
  ...filtersFromSearch(new URLSearchParams()),
  sort,
});
