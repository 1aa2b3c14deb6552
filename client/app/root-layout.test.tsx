import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { buildRow } from '#tests/factories/build-market-answers.ts';
import { sampleMember } from '#tests/helpers/sample-deal.ts';
import { apiServer } from '#tests/setup/api-server.ts';
import { queryClient } from '../lib/query-client.ts';
import { chooseTheme } from '../lib/theme.ts';
import { appRoutes } from './router.tsx';

const noQuotes = {
  now: '2026-12-01T14:00:00Z',
  state: 'none',
  marketUntil: null,
  staleAfterSeconds: 300,
  quotes: [],
};
const noLots = {
  rows: [],
  nextCursor: null,
  count: 0,
  isCountCapped: false,
  quoteState: 'none',
  quotedAt: null,
};

function open(path: string) {
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  const router = createMemoryRouter(appRoutes, { initialEntries: [path] });
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return router;
}

beforeEach(() => {
  queryClient.clear();
  apiServer.use(
    http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member: null })),
    http.get('/api/v1/quotes', () => HttpResponse.json(noQuotes)),
    http.get('/api/v1/lots', () => HttpResponse.json(noLots)),
  );
});

afterEach(() => {
  vi.restoreAllMocks();
  chooseTheme('system');
});

describe('the layout', () => {
  it('shows a page with its title, a way past the header and the cautions line', async () => {
    open('/');
    expect(await screen.findByRole('heading', { level: 1 })).toBeVisible();
    await waitFor(() => expect(document.title).toMatch(/ · Scruple$/));
    expect(screen.getByRole('link', { name: 'Skip to the page' })).toHaveAttribute('href', '#main');
    expect(screen.getByRole('main')).toHaveAttribute('id', 'main');
    expect(screen.getByRole('contentinfo')).toHaveTextContent('Check your local rules');
  });

  it('shows visitors no room of members', async () => {
    open('/');
    await screen.findByRole('heading', { level: 1 });
    expect(screen.queryByRole('link', { name: 'Deals' })).toBeNull();
    expect(screen.queryByRole('link', { name: 'Desk' })).toBeNull();
    expect(screen.queryByRole('link', { name: 'Sell' })).toBeNull();
  });

  it('leads members to what they sell and to their deals', async () => {
    const member = sampleMember();
    apiServer.use(http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member })));
    open('/');
    expect(await screen.findByRole('link', { name: 'Sell' })).toHaveAttribute('href', '/sell');
    expect(screen.getByRole('link', { name: 'Deals' })).toHaveAttribute('href', '/deals');
  });

  it('answers an unknown address with the way out, and moves the focus to the new heading', async () => {
    const router = open('/');
    await screen.findByRole('heading', { level: 1 });
    await router.navigate('/nowhere');
    const heading = await screen.findByRole('heading', { name: 'Nothing is filed under this address' });
    expect(heading).toHaveFocus();
    expect(screen.getByRole('link', { name: 'Go to the first page' })).toHaveAttribute('href', '/');
  });

  it('leads the desk back from a page that is kept for admins, instead of asking again', async () => {
    const member = { ...sampleMember(), role: 'desk' as const };
    member.can = { ...member.can, useDesk: true };
    apiServer.use(
      http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member })),
      http.get('/api/v1/admin/audit', () =>
        HttpResponse.json({ code: 'forbidden', title: 'Not allowed' }, { status: 403 }),
      ),
    );
    open('/desk/audit');
    await screen.findByRole('heading', { name: 'This page is not open to your account' });
    expect(screen.getByRole('link', { name: 'Go to the desk' })).toHaveAttribute('href', '/desk');
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull();
  });

  it('says on the first page that there is no quote, beside the lots', async () => {
    const rows = [buildRow('S-2K7F4Q', { melt: null, percentOfMelt: null })];
    apiServer.use(http.get('/api/v1/lots', () => HttpResponse.json({ ...noLots, rows })));
    open('/');
    expect(await screen.findByText('There is no quote')).toBeVisible();
    expect(screen.queryByText(/as it stands now/)).toBeNull();
  });

  it('sets the theme and goes back to the system’s', async () => {
    open('/');
    for (const theme of ['light', 'dark', undefined]) {
      await userEvent.click(await screen.findByRole('button', { name: /^Paper:/ }));
      expect(document.documentElement.dataset.theme).toBe(theme);
    }
  });
});
