import { QueryTypes } from 'sequelize';
import { QUOTE_STALE_SECONDS } from '#shared/limits.ts';
import { METALS, type Metal } from '#shared/metals.ts';
import { dec, plain } from '#shared/decimal.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import { sequelize } from '#server/database/connection.ts';
import { DayRate } from '#server/models/day-rate.ts';
import { Quote } from '#server/models/quote.ts';
import { QuoteCandidate } from '#server/models/quote-candidate.ts';
import { QuotePoll } from '#server/models/quote-poll.ts';

export type BoardQuote = {
  id: string;
  usdPerTroyOunce: string;
  at: Date;
  acceptedAt: Date;
  source: string;
  isFresh: boolean;
  isQuarantined: boolean;
};

/** The newest accepted quote of each metal and how far it can be relied on. */
export type QuoteBoard = {
  state: 'fresh' | 'partly' | 'stale' | 'closed' | 'none';
  marketUntil: Date | null;
  byMetal: Partial<Record<Metal, BoardQuote>>;
};

function boardState(quotes: readonly BoardQuote[], isMarketClosed: boolean): QuoteBoard['state'] {
  if (quotes.length === 0) return 'none';
  if (isMarketClosed) return 'closed';
  const fresh = quotes.filter((quote) => quote.isFresh).length;
  if (fresh === 0) return 'stale';
  return fresh === METALS.length ? 'fresh' : 'partly';
}

/** Reads four index entries and the last poll; no lot row is touched by a new quote, ever. */
export async function newestQuotes(now: Date): Promise<QuoteBoard> {
  const [quotes, poll, candidates] = await Promise.all([
    Promise.all(
      METALS.map((metal) =>
        Quote.findOne({
          where: { metal },
          order: [
            ['acceptedAt', 'DESC'],
            ['quotedAt', 'DESC'],
          ],
        }),
      ),
    ),
    QuotePoll.findOne({ order: [['polledAt', 'DESC']] }),
    QuoteCandidate.findAll(),
  ]);
  const quarantined = new Set(candidates.map((candidate) => candidate.metal));
  const byMetal: Partial<Record<Metal, BoardQuote>> = {};
  for (const quote of quotes) {
    if (quote === null) continue;
    const age = now.getTime() - quote.quotedAt.getTime();
    byMetal[quote.metal] = {
      id: quote.id,
      usdPerTroyOunce: plain(dec(quote.usdPerTroyOunce)),
      at: quote.quotedAt,
      acceptedAt: quote.acceptedAt,
      source: quote.source,
      isFresh: age <= QUOTE_STALE_SECONDS * 1000,
      isQuarantined: quarantined.has(quote.metal),
    };
  }
  // A poll that itself is old says nothing about the market now.
  const isPollRecent = poll !== null && now.getTime() - poll.polledAt.getTime() <= QUOTE_STALE_SECONDS * 1000;
  const isMarketClosed = isPollRecent && poll.marketOpen === false;
  return {
    state: boardState(Object.values(byMetal), isMarketClosed),
    marketUntil: isPollRecent ? poll.marketUntil : null,
    byMetal,
  };
}

/** The quotes as a sheet names them: id, time and source beside the value. */
export function quoteRefs(board: QuoteBoard): QuoteRef[] {
  return METALS.flatMap((metal) => {
    const quote = board.byMetal[metal];
    if (quote === undefined) return [];
    return [
      {
        id: quote.id,
        metal,
        usdPerTroyOunce: quote.usdPerTroyOunce,
        at: quote.at.toISOString(),
        source: quote.source,
      },
    ];
  });
}

/** The first accepted quote of each metal on that UTC day, or of the newest day before it. */
export async function dayRates(day: string): Promise<Partial<Record<Metal, string>>> {
  const rows = await Promise.all(
    METALS.map((metal) =>
      sequelize.query<{ metal: Metal; usd: string }>(
        `SELECT metal, usd_per_troy_ounce AS usd FROM day_rates WHERE metal = ? AND day <= ? ORDER BY day DESC LIMIT 1`,
        { replacements: [metal, day], type: QueryTypes.SELECT },
      ),
    ),
  );
  return Object.fromEntries(rows.flat().map(({ metal, usd }) => [metal, plain(dec(usd))]));
}

/** One value a day: the day's first accepted quote. */
export async function quoteHistory(
  metal: Metal,
  days: number,
  now: Date,
): Promise<{ rate: DayRate; quote: Quote | null }[]> {
  const from = new Date(now.getTime() - days * 86_400_000).toISOString().slice(0, 10);
  const rates = await sequelize.query<{ day: string }>(
    `SELECT day FROM day_rates WHERE metal = ? AND day >= ? ORDER BY day`,
    { replacements: [metal, from], type: QueryTypes.SELECT },
  );
  const found = await DayRate.findAll({
    where: { metal, day: rates.map((rate) => rate.day) },
    order: [['day', 'ASC']],
  });
  const quotes = await Quote.findAll({ where: { id: found.map((rate) => rate.quoteId) } });
  const byId = new Map(quotes.map((quote) => [quote.id, quote]));
  return found.map((rate) => ({ rate, quote: byId.get(rate.quoteId) ?? null }));
}
