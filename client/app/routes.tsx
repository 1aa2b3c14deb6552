import { matchRoutes, type RouteObject } from 'react-router-dom';

/**
 * The rooms of the house, one line per address. A route module exports `Component` and, as it needs them, `loader`
 * and `ErrorBoundary`. A line is added only when its module works: navigation and footer show no room that is not here.
 */
export const pageRoutes: RouteObject[] = [
  { path: '/', lazy: () => import('../routes/home.tsx') },
  { path: '/lots', lazy: () => import('../routes/register.tsx') },
  { path: '/lots/:code', lazy: () => import('../routes/lot.tsx') },
  { path: '/lots/:code/buy', lazy: () => import('../routes/purchase.tsx') },
  { path: '/quotes', lazy: () => import('../routes/quotes.tsx') },
  { path: '/worth', lazy: () => import('../routes/worth.tsx') },
  { path: '/desk', lazy: () => import('../routes/desk-queue.tsx') },
  { path: '/desk/certificates/:id', lazy: () => import('../routes/desk-case.tsx') },
  { path: '/desk/deals', lazy: () => import('../routes/desk-deals.tsx') },
  { path: '/desk/laboratories', lazy: () => import('../routes/desk-laboratories.tsx') },
  { path: '/desk/members', lazy: () => import('../routes/desk-members.tsx') },
  { path: '/desk/audit', lazy: () => import('../routes/desk-audit.tsx') },
  { path: '/admin/mails', lazy: () => import('../routes/admin-mails.tsx') },
  { path: '/deals', lazy: () => import('../routes/deals.tsx') },
  { path: '/deals/:code', lazy: () => import('../routes/deal.tsx') },
  { path: '/deals/:code/payment', lazy: () => import('../routes/payment-return.tsx') },
  { path: '/sign-in', lazy: () => import('../routes/sign-in.tsx') },
  { path: '/sign-up', lazy: () => import('../routes/sign-up.tsx') },
  { path: '/sell', lazy: () => import('../routes/sell.tsx') },
  { path: '/sell/:code', lazy: () => import('../routes/draft.tsx') },
  { path: '/account', lazy: () => import('../routes/account.tsx') },
  { path: '/methods', lazy: () => import('../routes/methods.tsx') },
  { path: '/cautions', lazy: () => import('../routes/cautions.tsx') },
];

export const notFoundRoute: RouteObject = { path: '*', lazy: () => import('../routes/not-found.tsx') };

/** Whether an address leads to a page, so that nothing links into the void. */
export function isRouted(path: string): boolean {
  return matchRoutes(pageRoutes, path) !== null;
}
