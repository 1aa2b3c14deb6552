import { quoteRoutes } from '#server/features/quotes/quote-routes.ts';
import { sessionRoutes } from '#server/features/members/session-routes.ts';
import type { RouteDefinition } from './define-route.ts';

/** Every route of the product. A test walks the mounted router and fails on one that does not stand here. */
export const allRoutes: readonly RouteDefinition[] = [...sessionRoutes, ...quoteRoutes];
