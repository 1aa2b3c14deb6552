import { registerAnswer, registerQuery } from '#shared/schemas/lots.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { answerRegister } from './answer-register.ts';

export const registerRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/lots',
    summary: 'The register of open lots: filters, three sorts, pages by cursor',
    access: 'public',
    limit: 'read',
    query: registerQuery,
    answer: registerAnswer,
    handle: async ({ query, res, viewer }) => {
      const answer = await answerRegister(query, viewer);
      // A signed-in reader's page says which lots are his own and is nobody else's.
      const cache = viewer === null ? 'public, max-age=5, stale-while-revalidate=30' : 'private, no-store';
      res.set('Cache-Control', cache).vary('Cookie').json(answer);
    },
  }),
];
