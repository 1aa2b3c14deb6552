import { valuationAnswer, valuationRequest, type ValuationBody } from '#shared/schemas/valuations.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { newestQuotes, quoteRefs, type QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import type { ValuationAnswer } from '#shared/settlement/valuation.ts';
import { valueMass } from './value-mass.ts';

function needsCurrentQuotes({ contents, quotes }: ValuationBody): boolean {
  return contents.some(({ metal }) => quotes?.[metal as 'Au'] === undefined);
}

/** An old quote is never used without a word: it stands among what was assumed. A closed market's last quote is not old. */
function withOldQuotesNamed(answer: ValuationAnswer, board: QuoteBoard | null): ValuationAnswer {
  if (board === null || board.state === 'closed') return answer;
  const old = answer.metals.flatMap(({ metal, quote }) =>
    quote.source === 'given' || board.byMetal[metal]?.isFresh === true
      ? []
      : [
          {
            field: `/quotes/${metal}`,
            value: quote.usdPerTroyOunce,
            reason: `Not given, and no quote is fresh: the last accepted one, of ${quote.at ?? 'an unknown time'}.`,
          },
        ],
  );
  return { ...answer, assumed: [...answer.assumed, ...old] };
}

export const valuationRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: '/api/v1/valuations',
    summary: 'What any mass and assay is worth, at quotes given or at the newest accepted ones',
    access: 'public',
    limit: 'valuation',
    csrf: 'exempt',
    body: valuationRequest,
    answer: valuationAnswer,
    handle: async ({ body, res }) => {
      const board = needsCurrentQuotes(body) ? await newestQuotes(await databaseNow()) : null;
      const answer = valueMass(body, board === null ? [] : quoteRefs(board));
      res.set('Cache-Control', 'no-store').json(withOldQuotesNamed(answer, board));
    },
  }),
];
