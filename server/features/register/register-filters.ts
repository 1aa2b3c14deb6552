import { cut, dec, plain } from '#shared/decimal.ts';
import { GRAMS_PER_TROY_OUNCE } from '#shared/mass.ts';
import { METALS, type Metal } from '#shared/metals.ts';
import type { RegisterQuery } from '#shared/schemas/lots.ts';
import type { RankQuotes, Stream } from './register-cursor.ts';

/** A piece of a WHERE clause with its values, in the order of the question marks. */
export type Clause = { sql: string; values: (string | Date)[] };

/** Digits after the dot of the key of each kind of stream, as its column holds them. */
export const RANK_DECIMALS = 8;
export const LINKED_DECIMALS = 4;

/**
 * What a stream's key is divided by to compare it with other streams'. A sum's key is US$ per fine gram, at the quote per
 * troy ounce; a linked lot's is the percentage itself, which is worth the same at any quote.
 */
export function rateOf(stream: Stream, quotes: RankQuotes): string | undefined {
  return stream === 'linked' ? plain(dec(GRAMS_PER_TROY_OUNCE).times(100)) : quotes[stream];
}

export function allOf(clauses: readonly Clause[]): Clause {
  return {
    sql: clauses.map(({ sql }) => `(${sql})`).join(' AND '),
    values: clauses.flatMap(({ values }) => values),
  };
}

/**
 * A column held to one value, written as a range. With an equality the server prefers to walk the whole of that value's
 * index entries and to skip what an earlier page showed; from a range it starts where the page starts. The ORDER BY names
 * the column too, so that the index gives the order.
 */
export function only(column: string, value: string): Clause {
  return { sql: `${column} >= ? AND ${column} <= ?`, values: [value, value] };
}

/** Price per fine gram at a percentage of melt value: % ÷ 100 × rate ÷ grams in a troy ounce. */
function rankAt(percent: string, usdPerTroyOunce: string) {
  return dec(percent).times(usdPerTroyOunce).div(100).div(GRAMS_PER_TROY_OUNCE);
}

/**
 * Bounds of % of melt value as bounds of the static key at the listing's quotes: the key is held with eight decimals, so
 * an inclusive bound is met by rounding it inwards.
 */
function percentClause({ percentMin, percentMax }: RegisterQuery, metal: Metal, rate: string): Clause {
  const values = [metal as string];
  let sql = 'lots.main_metal = ?';
  if (percentMin !== undefined) {
    const bound = rankAt(percentMin, rate);
    const floor = dec(cut(bound, RANK_DECIMALS));
    const step = dec('0.00000001');
    sql += ' AND lots.rank_price >= CAST(? AS DECIMAL(30,8))';
    values.push(plain(floor.lt(bound) ? floor.plus(step) : floor));
  }
  if (percentMax !== undefined) {
    sql += ' AND lots.rank_price <= CAST(? AS DECIMAL(30,8))';
    values.push(cut(rankAt(percentMax, rate), RANK_DECIMALS));
  }
  return { sql, values };
}

/** A linked lot stands at its percentage; the bounds hold for it as they are. */
function linkedPercentClause({ percentMin, percentMax }: RegisterQuery): Clause {
  const values: string[] = [];
  let sql = 'lots.linked_percent IS NOT NULL';
  if (percentMin !== undefined) {
    sql += ' AND lots.linked_percent >= CAST(? AS DECIMAL(50,20))';
    values.push(percentMin);
  }
  if (percentMax !== undefined) {
    sql += ' AND lots.linked_percent <= CAST(? AS DECIMAL(50,20))';
    values.push(percentMax);
  }
  return { sql, values };
}

function percentClauses(query: RegisterQuery, metals: readonly Metal[], quotes: RankQuotes): Clause[] {
  if (query.percentMin === undefined && query.percentMax === undefined) return [];
  const options = metals.flatMap((metal) => {
    const rate = quotes[metal];
    return rate === undefined ? [] : [percentClause(query, metal, rate)];
  });
  options.push(linkedPercentClause(query));
  return [
    {
      sql: options.map(({ sql }) => `(${sql})`).join(' OR '),
      values: options.flatMap(({ values }) => values),
    },
  ];
}

const COMPARED = [
  ['finenessMin', 'lots.main_fineness_permille >= CAST(? AS DECIMAL(50,20))'],
  ['finenessMax', 'lots.main_fineness_permille <= CAST(? AS DECIMAL(50,20))'],
  ['fineGramsMin', 'lots.main_fine_grams >= CAST(? AS DECIMAL(50,20))'],
  ['fineGramsMax', 'lots.main_fine_grams <= CAST(? AS DECIMAL(50,20))'],
] as const;

/** Metals whose streams a listing reads. */
export function metalsOf(query: RegisterQuery): readonly Metal[] {
  return query.metal === undefined ? METALS : [query.metal];
}

/** Everything that narrows a listing but the state and the main metal, which the index of each sort begins with. */
export function filtersOf(query: RegisterQuery, quotes: RankQuotes): Clause[] {
  const clauses: Clause[] = [];
  if (query.form !== undefined) clauses.push({ sql: 'lots.form = ?', values: [query.form] });
  if (query.grade !== undefined) clauses.push({ sql: 'lots.evidence_grade = ?', values: [query.grade] });
  for (const [name, sql] of COMPARED) {
    const value = query[name];
    if (value !== undefined) clauses.push({ sql, values: [value] });
  }
  if (query.destination !== undefined) {
    clauses.push({ sql: 'JSON_CONTAINS(lots.destinations, JSON_QUOTE(?))', values: [query.destination] });
  }
  return [...clauses, ...percentClauses(query, metalsOf(query), quotes)];
}
