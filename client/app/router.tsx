import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { PageWaiting } from '../components/ui/page-waiting.tsx';
import { sessionQuery } from '../lib/session.ts';
import { queryClient } from '../lib/query-client.ts';
import { ErrorPage } from './error-page.tsx';
import { RootLayout } from './root-layout.tsx';
import { notFoundRoute, pageRoutes } from './routes.tsx';

/** The session is asked for beside the page's own data; a page that fails to load still has its header. */
async function loadSession(): Promise<null> {
  await queryClient.prefetchQuery(sessionQuery);
  return null;
}

/** A failing page is shown inside the layout, so that the way out stays on the screen. */
export const appRoutes: RouteObject[] = [
  {
    path: '/',
    Component: RootLayout,
    ErrorBoundary: ErrorPage,
    HydrateFallback: PageWaiting,
    loader: loadSession,
    shouldRevalidate: () => false,
    children: [{ ErrorBoundary: ErrorPage, children: [...pageRoutes, notFoundRoute] }],
  },
];

export function createAppRouter() {
  return createBrowserRouter(appRoutes);
}
