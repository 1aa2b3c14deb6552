import { QUOTE_STALE_SECONDS } from '#shared/limits.ts';
import { METALS } from '#shared/metals.ts';
import { dec, plain } from '#shared/decimal.ts';
import {
  quoteHistoryAnswer,
  quoteHistoryQuery,
  quotesAnswer,
  type QuoteAnswer,
} from '#shared/schemas/quotes.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { newestQuotes, quoteHistory, type BoardQuote } from './quote-queries.ts';

function presentQuote(metal: QuoteAnswer['metal'], quote: BoardQuote, now: Date): QuoteAnswer {
  return {
    id: quote.id,
    metal,
    usdPerTroyOunce: quote.usdPerTroyOunce,
    at: quote.at.toISOString(),
    acceptedAt: quote.acceptedAt.toISOString(),
    source: quote.source,
    ageSeconds: Math.max(0, Math.floor((now.getTime() - quote.at.getTime()) / 1000)),
    isFresh: quote.isFresh,
    isQuarantined: quote.isQuarantined,
  };
}

export const quoteRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/quotes',
    summary: 'The newest accepted quote of each metal, with its age',
    access: 'public',
    limit: 'read',
    answer: quotesAnswer,
    handle: async ({ res }) => {
      const now = await databaseNow();
      const board = await newestQuotes(now);
      res.json({
        now: now.toISOString(),
        state: board.state,
        marketUntil: board.marketUntil?.toISOString() ?? null,
        staleAfterSeconds: QUOTE_STALE_SECONDS,
        quotes: METALS.flatMap((metal) => {
          const quote = board.byMetal[metal];
          return quote === undefined ? [] : [presentQuote(metal, quote, now)];
        }),
      });
    },
  }),
  defineRoute({
    method: 'get',
    path: '/api/v1/quotes/history',
    summary: 'One value a day of one metal: the first accepted of each UTC day',
    access: 'public',
    limit: 'read',
    query: quoteHistoryQuery,
    answer: quoteHistoryAnswer,
    handle: async ({ res, query }) => {
      const history = await quoteHistory(query.metal, query.days, await databaseNow());
      res.json({
        metal: query.metal,
        points: history.map(({ rate, quote }) => ({
          day: rate.day,
          usdPerTroyOunce: plain(dec(rate.usdPerTroyOunce)),
          at: (quote?.quotedAt ?? rate.createdAt).toISOString(),
          source: quote?.source ?? 'unknown',
        })),
      });
    },
  }),
];
