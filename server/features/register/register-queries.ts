import { QueryTypes } from 'sequelize';
import { cut, dec, plain, type Dec } from '#shared/decimal.ts';
import { invariant } from '#server/app-error.ts';
import { REGISTER_COUNT_MAX } from '#shared/limits.ts';
import type { Metal } from '#shared/metals.ts';
import type { RegisterQuery } from '#shared/schemas/lots.ts';
import { sequelize } from '#server/database/connection.ts';
import type { Position, RankQuotes, Stream } from './register-cursor.ts';
import {
  allOf,
  filtersOf,
  LINKED_DECIMALS,
  metalsOf,
  only,
  RANK_DECIMALS,
  rateOf,
  type Clause,
} from './register-filters.ts';

/** A row of the listing before its lot is read: what it is ordered by. */
export type Ranked = { id: string; stream: Stream; value: string | null };

type Listing = { query: RegisterQuery; quotes: RankQuotes; after: Position | null };

const OPEN = only('lots.state', 'open');
const ofMetal = (metal: Metal) => only('lots.main_metal', metal);

type Reading = { value: string; order: string; stream?: string };

async function select(where: Clause, reading: Reading, limit: number) {
  const { value, order, stream = 'lots.main_metal' } = reading;
  return sequelize.query<Ranked>(
    `SELECT lots.id, ${stream} AS stream, ${value} AS value FROM lots
     WHERE ${where.sql} ORDER BY ${order} LIMIT ${limit}`,
    { replacements: where.values, type: QueryTypes.SELECT },
  );
}

/** Newest first, by one index for all metals. */
async function newest({ query, quotes, after }: Listing, limit: number): Promise<Ranked[]> {
  const clauses = [OPEN, ...filtersOf(query, quotes)];
  if (query.metal !== undefined) clauses.push({ sql: 'lots.main_metal = ?', values: [query.metal] });
  if (after !== null) {
    const at = new Date(after.value ?? 0);
    clauses.push({ sql: 'lots.opened_at <= ?', values: [at] });
    clauses.push({ sql: 'lots.opened_at < ? OR lots.id < ?', values: [at, after.id] });
  }
  const rows = await select(
    allOf(clauses),
    { value: 'lots.opened_at', order: 'lots.state DESC, lots.opened_at DESC, lots.id DESC' },
    limit,
  );
  return rows.map((row) => ({ ...row, value: new Date(row.value ?? 0).toISOString() }));
}

/** Most fine grams of the main metal first; one stream a metal, each by its index, merged. */
async function byFineContent({ query, quotes, after }: Listing, limit: number): Promise<Ranked[]> {
  const filters = filtersOf(query, quotes);
  const streams = await Promise.all(
    metalsOf(query).map((metal) => {
      const clauses = [OPEN, ofMetal(metal), ...filters];
      if (after?.value) {
        const grams = after.value;
        clauses.push({ sql: 'lots.main_fine_grams <= CAST(? AS DECIMAL(30,15))', values: [grams] });
        clauses.push({
          sql: 'lots.main_fine_grams < CAST(? AS DECIMAL(30,15)) OR lots.id < ?',
          values: [grams, after.id],
        });
      }
      return select(
        allOf(clauses),
        {
          value: 'lots.main_fine_grams',
          order: 'lots.state DESC, lots.main_metal DESC, lots.main_fine_grams DESC, lots.id DESC',
        },
        limit,
      );
    }),
  );
  return streams
    .flat()
    .sort((left, right) => dec(right.value ?? '0').cmp(left.value ?? '0') || (left.id < right.id ? 1 : -1))
    .slice(0, limit);
}

/** The order of % of melt value across metals: key ÷ rate, lowest first; rows that cannot be ranked at the end, by id. */
function percentOrder(quotes: RankQuotes) {
  const indexOf = ({ stream, value }: Ranked): Dec | null => {
    const rate = rateOf(stream, quotes);
    return value === null || rate === undefined ? null : dec(value).div(rate);
  };
  return (left: Ranked, right: Ranked): number => {
    const [a, b] = [indexOf(left), indexOf(right)];
    const byIndex = a === null || b === null ? Number(a === null) - Number(b === null) : a.cmp(b);
    return byIndex || (left.id < right.id ? -1 : 1);
  };
}

const KEYS = {
  sum: { column: 'lots.rank_price', type: 'DECIMAL(30,8)', decimals: RANK_DECIMALS },
  linked: { column: 'lots.linked_percent', type: 'DECIMAL(8,4)', decimals: LINKED_DECIMALS },
} as const;

const keyOf = (stream: Stream) => (stream === 'linked' ? KEYS.linked : KEYS.sum);

/**
 * Rows of one stream after a position of another: `key ÷ rate` is compared exactly by carrying the position's key over to
 * this stream's rate. A key has so many decimals, so what lies above the quotient lies above its first ones.
 */
function afterPosition(after: Position, stream: Stream, quotes: RankQuotes): Clause {
  invariant(after.stream !== null && after.value !== null, 'a ranked position has its stream and key');
  const [rate, own] = [rateOf(stream, quotes), rateOf(after.stream, quotes)];
  invariant(rate !== undefined && own !== undefined, 'a ranked position has its quote');
  const { column, type, decimals } = keyOf(stream);
  const exact = dec(after.value).times(rate).div(own);
  const bound = cut(exact, decimals);
  const isTieable = dec(bound).times(own).eq(dec(after.value).times(rate));
  if (!isTieable) return { sql: `${column} > CAST(? AS ${type})`, values: [bound] };
  return {
    sql: `${column} >= CAST(? AS ${type}) AND (${column} > CAST(? AS ${type}) OR lots.id > ?)`,
    values: [bound, bound, after.id],
  };
}

/** The linked lots stand in an index of their own, which names the metal only to filter by it. */
function streamClauses(stream: Stream, metal: Metal | undefined): Clause[] {
  const { column } = keyOf(stream);
  const ranked = { sql: `${column} IS NOT NULL`, values: [] };
  if (stream !== 'linked') return [OPEN, ofMetal(stream), ranked];
  return metal === undefined
    ? [OPEN, ranked]
    : [OPEN, ranked, { sql: 'lots.main_metal = ?', values: [metal] }];
}

function streamReading(stream: Stream): Reading {
  const { column: value } = keyOf(stream);
  return stream === 'linked'
    ? { value, order: `lots.state, ${value}, lots.id`, stream: `'linked'` }
    : { value, order: `lots.state, lots.main_metal, ${value}, lots.id` };
}

/**
 * Cheapest in % of melt value first: one stream a metal by the index on its static key, and one of the linked lots by their
 * percentage, merged at the listing's quotes.
 */
async function byPercent(listing: Listing, limit: number): Promise<Ranked[]> {
  const { query, quotes, after } = listing;
  const filters = filtersOf(query, quotes);
  const quoted = metalsOf(query).filter((metal) => quotes[metal] !== undefined);
  const isPastRanked = after !== null && after.value === null;
  const streams: Stream[] = isPastRanked ? [] : [...quoted, 'linked'];
  const found = await Promise.all(
    streams.map((stream) => {
      const clauses = [...streamClauses(stream, query.metal), ...filters];
      if (after !== null) clauses.push(afterPosition(after, stream, quotes));
      return select(allOf(clauses), streamReading(stream), limit);
    }),
  );
  const ranked = found.flat().sort(percentOrder(quotes)).slice(0, limit);
  if (ranked.length === limit) return ranked;
  return [...ranked, ...(await unranked(listing, quoted, limit - ranked.length))];
}

/** What has no key or no quote stands at the end of the listing, by id. */
async function unranked(
  { query, quotes, after }: Listing,
  quoted: readonly Metal[],
  limit: number,
): Promise<Ranked[]> {
  const filters = filtersOf(query, quotes);
  const afterId = after !== null && after.value === null ? after.id : null;
  const streams = await Promise.all(
    metalsOf(query).map((metal) => {
      const clauses = [OPEN, ofMetal(metal), { sql: 'lots.linked_percent IS NULL', values: [] }, ...filters];
      if (quoted.includes(metal)) clauses.push({ sql: 'lots.rank_price IS NULL', values: [] });
      if (afterId !== null) clauses.push({ sql: 'lots.id > ?', values: [afterId] });
      return select(allOf(clauses), { value: 'NULL', order: 'lots.id' }, limit);
    }),
  );
  return streams
    .flat()
    .sort((left, right) => (left.id < right.id ? -1 : 1))
    .slice(0, limit);
}

const SORTS = { newest, 'fine-content': byFineContent, 'percent-of-melt': byPercent } as const;

/** One row more than the page holds, so that the caller knows whether another follows. */
export async function listLots(listing: Listing): Promise<Ranked[]> {
  const rows = await SORTS[listing.query.sort](listing, listing.query.limit + 1);
  return rows.map((row) => ({ ...row, value: row.value === null ? null : tidy(row.value) }));
}

function tidy(value: string): string {
  return value.includes('T') ? value : plain(dec(value));
}

/** How many lots the filters leave, counted up to one more than is ever told. */
export async function countLots(query: RegisterQuery, quotes: RankQuotes): Promise<number> {
  const clauses = [OPEN, ...filtersOf(query, quotes)];
  if (query.metal !== undefined) clauses.push({ sql: 'lots.main_metal = ?', values: [query.metal] });
  const where = allOf(clauses);
  const rows = await sequelize.query<{ count: number }>(
    `SELECT COUNT(*) AS count FROM (SELECT 1 FROM lots WHERE ${where.sql} LIMIT ${REGISTER_COUNT_MAX + 1}) AS found`,
    { replacements: where.values, type: QueryTypes.SELECT },
  );
  return rows[0]?.count ?? 0;
}
