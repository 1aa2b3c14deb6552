import { matchRoutes, type RouteObject } from 'react-router-dom';

/**
 * The rooms of the house, one line per address. A route module exports `Component` and, as it needs them, `loader`
 * and `ErrorBoundary`. A line is added only when its module works: navigation and footer show no room that is not here.
 */
export const pageRoutes: RouteObject[] = [{ path: '/', lazy: () => import('../routes/home.tsx') }];

export const notFoundRoute: RouteObject = { path: '*', lazy: () => import('../routes/not-found.tsx') };

/** Whether an address leads to a page, so that nothing links into the void. */
export function isRouted(path: string): boolean {
  return matchRoutes(pageRoutes, path) !== null;
}
