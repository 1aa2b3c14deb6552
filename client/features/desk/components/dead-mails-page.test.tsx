import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, describe, expect, it } from 'vitest';
import type { DeadMailRow } from '#shared/schemas/admin.ts';
import { sampleMember } from '#tests/helpers/sample-deal.ts';
import { apiServer } from '#tests/setup/api-server.ts';
import { queryClient } from '../../../lib/query-client.ts';
import * as mailsRoute from '../../../routes/admin-mails.tsx';

const dead: DeadMailRow = {
  id: '018f0000-0000-7000-8000-000000000021',
  mail: 'payout-failed',
  member: { id: '018f0000-0000-7000-8000-00000000000b', displayName: 'Tom Wray' },
  recipient: 'tom.wray@harrow.example',
  tries: 8,
  lastError: '451 try later',
  orderedAt: '2026-11-29T09:00:00.000Z',
  deadSince: '2026-11-30T09:00:00.000Z',
};

function open() {
  const router = createMemoryRouter([{ path: '/admin/mails', ...mailsRoute, HydrateFallback: () => null }], {
    initialEntries: ['/admin/mails'],
  });
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
}

beforeEach(() => {
  queryClient.clear();
  const member = { ...sampleMember(), role: 'admin' as const };
  apiServer.use(http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member })));
});

describe('the page of mails that were given up', () => {
  it('says what became of a mail, and sends it again', async () => {
    let rows = [dead];
    apiServer.use(
      http.get('/api/v1/admin/mails', () => HttpResponse.json({ rows, total: rows.length })),
      http.post(`/api/v1/admin/mails/${dead.id}/send-again`, () => {
        rows = [];
        return HttpResponse.json({ rows, total: 0 });
      }),
    );
    open();
    expect(await screen.findByText('payout failed')).toBeVisible();
    expect(screen.getByText(/after 8 tries; the last one said: 451 try later/)).toBeVisible();
    expect(screen.getByRole('link', { name: 'Mails' })).toHaveAttribute('href', '/admin/mails');
    await userEvent.click(screen.getByRole('button', { name: /^Send again: payout failed, to tom\.wray/ }));
    expect(await screen.findByText('No mail was given up')).toBeVisible();
  });

  it('says why a mail was not ordered, and keeps it in the list', async () => {
    apiServer.use(
      http.get('/api/v1/admin/mails', () => HttpResponse.json({ rows: [dead], total: 140 })),
      http.post(`/api/v1/admin/mails/${dead.id}/send-again`, () =>
        HttpResponse.json(
          { code: 'conflict', title: 'Conflict', detail: 'It is due already.' },
          { status: 409 },
        ),
      ),
    );
    open();
    await userEvent.click(await screen.findByRole('button', { name: /^Send again/ }));
    await waitFor(() =>
      expect(screen.getByRole('alert')).toHaveTextContent('Not ordered: It is due already.'),
    );
    expect(screen.getByText('payout failed')).toBeVisible();
    expect(screen.getByText(/The newest 1 of 140/)).toBeVisible();
  });
});
