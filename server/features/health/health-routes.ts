import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { AppError } from '#server/app-error.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';

export const healthRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/healthz',
    summary: 'The process answers',
    access: 'public',
    limit: 'read',
    handle: ({ res }) => {
      res.json({ alive: true });
    },
  }),
  defineRoute({
    method: 'get',
    path: '/readyz',
    summary: 'The process answers and its database does',
    access: 'public',
    limit: 'read',
    handle: async ({ res }) => {
      try {
        await sequelize.query('SELECT 1 AS one', { type: QueryTypes.SELECT });
      } catch {
        throw new AppError('service-unavailable', 'The database does not answer');
      }
      res.json({ ready: true });
    },
  }),
];
