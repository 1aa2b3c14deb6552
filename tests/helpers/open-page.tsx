import { QueryClientProvider } from '@tanstack/react-query';
import { configure, render } from '@testing-library/react';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';
import { apiServer } from '../setup/api-server.ts';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { appRoutes } from '#client/app/router.tsx';
import { queryClient } from '#client/lib/query-client.ts';
import { buildQuotes } from '../factories/build-market-answers.ts';

// Pages are lazy modules: the first one of a run takes its time on a busy machine.
configure({ asyncUtilTimeout: 8_000 });
vi.setConfig({ testTimeout: 20_000 });

/** Opens an address of the whole client, as that member or as a visitor, with fresh quotes. */
export function openPage(path: string, member: MemberAnswer | null = null) {
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  window.sessionStorage.clear();
  queryClient.clear();
  apiServer.use(
    http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member })),
    http.get('/api/v1/quotes', () => HttpResponse.json(buildQuotes())),
  );
  const router = createMemoryRouter(appRoutes, { initialEntries: [path] });
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return router;
}
