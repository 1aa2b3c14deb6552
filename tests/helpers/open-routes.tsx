import { QueryClientProvider } from '@tanstack/react-query';
import { configure, render } from '@testing-library/react';
import { createMemoryRouter, RouterProvider, type RouteObject } from 'react-router-dom';
import { vi } from 'vitest';
import { rememberCsrfToken } from '#client/lib/api-client.ts';
import { queryClient } from '#client/lib/query-client.ts';

// A busy machine takes its time for a page.
configure({ asyncUtilTimeout: 8_000 });
vi.setConfig({ testTimeout: 20_000 });

/** Opens an address under these route modules alone, without the layout; what they do not know answers 'elsewhere'. */
export function openRoutes(routes: RouteObject[], address: string) {
  queryClient.clear();
  rememberCsrfToken('t');
  const known = routes.map((route) => ({ ...route, HydrateFallback: () => null }) as RouteObject);
  const router = createMemoryRouter([...known, { path: '*', element: <p>elsewhere</p> }], {
    initialEntries: [address],
  });
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return router;
}
