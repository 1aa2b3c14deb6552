import { auditAnswer, auditQuery } from '#shared/schemas/desk.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { presentAudit } from './audit-presenter.ts';
import { auditPage } from './audit-queries.ts';

export const auditRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/admin/audit',
    summary: 'The audit trail, newest first',
    access: 'admin',
    limit: 'read',
    query: auditQuery,
    answer: auditAnswer,
    handle: async ({ res, query }) => {
      const before = query.before === undefined ? null : new Date(query.before);
      res.json(presentAudit(await auditPage(before, query.limit)));
    },
  }),
];
