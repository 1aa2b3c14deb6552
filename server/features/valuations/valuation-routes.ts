import { valuationAnswer, valuationRequest, type ValuationBody } from '#shared/schemas/valuations.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { newestQuotes, quoteRefs } from '#server/features/quotes/quote-queries.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { valueMass } from './value-mass.ts';

function needsCurrentQuotes({ contents, quotes }: ValuationBody): boolean {
  return contents.some(({ metal }) => quotes?.[metal as 'Au'] === undefined);
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
      const current = needsCurrentQuotes(body) ? quoteRefs(await newestQuotes(await databaseNow())) : [];
      res.set('Cache-Control', 'no-store').json(valueMass(body, current));
    },
  }),
];
