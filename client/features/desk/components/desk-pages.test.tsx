import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { DeskMemberAnswer, LaboratoryAnswer, QueueRow } from '#shared/schemas/desk.ts';
import { apiServer } from '#tests/setup/api-server.ts';
import { queryClient } from '../../../lib/query-client.ts';
import * as auditRoute from '../../../routes/desk-audit.tsx';
import * as dealsRoute from '../../../routes/desk-deals.tsx';
import * as laboratoriesRoute from '../../../routes/desk-laboratories.tsx';
import * as membersRoute from '../../../routes/desk-members.tsx';
import * as queueRoute from '../../../routes/desk-queue.tsx';

function open(address: string) {
  const page = (path: string, route: typeof queueRoute) => ({ path, ...route, HydrateFallback: () => null });
  const router = createMemoryRouter(
    [
      page('/desk', queueRoute),
      page('/desk/deals', dealsRoute),
      page('/desk/members', membersRoute as typeof queueRoute),
      page('/desk/laboratories', laboratoriesRoute),
      page('/desk/audit', auditRoute),
    ],
    { initialEntries: [address] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return router;
}

const row: QueueRow = {
  id: '018f0000-0000-7000-8000-000000000001',
  lotCode: 'S-2K7F4Q',
  lotTitle: 'Button of the first batch',
  form: 'button',
  laboratoryName: 'Brackwater Assay',
  number: 'B-1207',
  submittedAt: '2026-11-30T09:00:00.000Z',
  state: 'submitted',
  claimedBy: null,
  isMine: false,
  flags: 2,
  can: { claim: true, open: true },
};
const member: DeskMemberAnswer = {
  id: '018f0000-0000-7000-8000-00000000000b',
  displayName: 'Tom Wray',
  region: 'Harrow Vale',
  role: 'member',
  suspendedAt: null,
  suspensionReason: null,
  can: { suspend: true, reinstate: false },
};
const laboratory: LaboratoryAnswer = {
  id: '018f0000-0000-7000-8000-00000000000a',
  name: 'Brackwater Assay',
  accreditationBody: 'Accreditation of Harrow Vale',
  accreditationNumber: 'HV-17',
  scope: 'Gold, fire assay',
  region: 'Harrow Vale',
  contact: '+00 555 0100',
  validUntil: '2028-01-31',
  isActive: true,
};

beforeEach(() => {
  queryClient.clear();
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  apiServer.use(http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member: null })));
});

describe('the queue page', () => {
  it('links to each case with its flags, and leaves an own case unlinked', async () => {
    const own = {
      ...row,
      id: row.id.replace(/1$/, '2'),
      lotTitle: 'Mine',
      can: { claim: false, open: false },
    };
    apiServer.use(
      http.get('/api/v1/desk/certificates', () => HttpResponse.json({ waiting: [row, own], decided: [] })),
    );
    open('/desk');
    const link = await screen.findByRole('link', { name: row.lotTitle });
    expect(link).toHaveAttribute('href', `/desk/certificates/${row.id}`);
    expect(screen.getAllByText('2 flags')).toHaveLength(2);
    expect(screen.queryByRole('link', { name: 'Mine' })).toBeNull();
    expect(screen.getByText(/your own lot, for a colleague/)).toBeVisible();
  });

  it('says so when nothing waits', async () => {
    apiServer.use(
      http.get('/api/v1/desk/certificates', () => HttpResponse.json({ waiting: [], decided: [] })),
    );
    open('/desk');
    expect(await screen.findByText('Nothing waits')).toBeVisible();
  });
});

describe('the members page', () => {
  it('searches by the address and suspends with a reason, restated first', async () => {
    const asked: (string | null)[] = [];
    let sent: unknown = null;
    apiServer.use(
      http.get('/api/v1/desk/members', ({ request }) => {
        asked.push(new URL(request.url).searchParams.get('query'));
        return HttpResponse.json({ members: [member] });
      }),
      http.post(`/api/v1/desk/members/${member.id}/suspend`, async ({ request }) => {
        sent = await request.json();
        return HttpResponse.json(member);
      }),
    );
    const router = open('/desk/members');
    await userEvent.type(await screen.findByLabelText(/Name or e-mail/), 'wray');
    await userEvent.click(screen.getByRole('button', { name: 'Find' }));
    await waitFor(() => expect(router.state.location.search).toBe('?query=wray'));
    expect(await screen.findByRole('heading', { name: 'Found for “wray”' })).toBeVisible();
    await userEvent.click(screen.getByText('Suspend Tom Wray', { selector: 'summary' }));
    const form = screen.getByRole('form', { name: 'Suspend Tom Wray' });
    await userEvent.type(within(form).getByLabelText('Reason'), 'Sold another metal than was stated.');
    await userEvent.click(within(form).getByRole('button', { name: 'Suspend Tom Wray' }));
    expect(sent).toBeNull();
    const panel = within(form).getByRole('region', { name: 'Confirm' });
    await userEvent.click(within(panel).getByRole('button', { name: 'Suspend Tom Wray' }));
    await waitFor(() => expect(sent).toEqual({ reason: 'Sold another metal than was stated.' }));
    await waitFor(() => expect(asked).toEqual(['', 'wray', 'wray']));
  });
});

describe('the register of laboratories', () => {
  it('shows a refusal of the server at its field and keeps what was typed', async () => {
    apiServer.use(
      http.get('/api/v1/laboratories', () => HttpResponse.json({ laboratories: [laboratory] })),
      http.put(`/api/v1/laboratories/${laboratory.id}`, () =>
        HttpResponse.json(
          {
            code: 'invalid-input',
            title: 'Some fields need another value',
            errors: [
              {
                pointer: '/accreditationNumber',
                code: 'accreditation-taken',
                message: 'It stands there already',
              },
            ],
          },
          { status: 422 },
        ),
      ),
    );
    open('/desk/laboratories');
    await userEvent.click(await screen.findByRole('link', { name: 'Change Brackwater Assay' }));
    const field = await screen.findByLabelText('Accreditation number');
    expect(field).toHaveValue('HV-17');
    await userEvent.clear(field);
    await userEvent.type(field, 'HV-18');
    await userEvent.click(screen.getByRole('button', { name: 'Change the entry' }));
    await userEvent.click(screen.getByRole('button', { name: 'Change Brackwater Assay' }));
    expect(await screen.findByRole('link', { name: 'It stands there already' })).toBeVisible();
    expect(screen.getByLabelText('Accreditation number')).toBeInvalid();
    expect(screen.getByLabelText('Accreditation number')).toHaveValue('HV-18');
  });
});

describe('contested deals and the audit trail', () => {
  it('links to a deal with its sum and deadline, and not to an own one', async () => {
    const deal = {
      code: 'D-2K7F4Q',
      lotTitle: 'Bar of silver',
      reason: 'Wrong mass',
      contestedAt: '2026-11-29T09:00:00.000Z',
      decideBy: '2026-12-06T09:00:00.000Z',
      total: '1925.00',
      isOwn: false,
    };
    const own = { ...deal, code: 'D-3M8G5R', lotTitle: 'My own', isOwn: true };
    const late = {
      code: 'D-7Q2M4T',
      lotTitle: 'Grain of gold',
      deliveredAt: '2026-11-20T09:00:00.000Z',
      inspectBy: '2026-11-25T09:00:00.000Z',
      total: '940.00',
      isOwn: false,
    };
    apiServer.use(
      http.get('/api/v1/desk/deals', () => HttpResponse.json({ contested: [deal, own], overdue: [late] })),
    );
    open('/desk/deals');
    expect(await screen.findByRole('link', { name: 'Bar of silver' })).toHaveAttribute(
      'href',
      '/deals/D-2K7F4Q',
    );
    expect(screen.getAllByText(/US\$\s1,925\.00/)).toHaveLength(2);
    expect(screen.queryByRole('link', { name: 'My own' })).toBeNull();
    const overdue = within(screen.getByRole('region', { name: 'Overdue inspections' }));
    expect(overdue.getByRole('link', { name: 'Grain of gold' })).toHaveAttribute('href', '/deals/D-7Q2M4T');
  });

  it('fetches earlier lines on request', async () => {
    const line = (act: string) => ({
      at: '2026-11-29T09:00:00.000Z',
      who: 'Ines Calder',
      role: 'desk',
      act,
      subject: 'lot S-2K7F4Q',
      detail: { reason: 'because' },
    });
    apiServer.use(
      http.get('/api/v1/admin/audit', ({ request }) =>
        HttpResponse.json(
          new URL(request.url).searchParams.has('before')
            ? { rows: [line('add-laboratory')], nextBefore: null }
            : { rows: [line('pull-lot')], nextBefore: '2026-11-29T09:00:00.000Z' },
        ),
      ),
    );
    open('/desk/audit');
    expect(await screen.findByText('pull lot')).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Earlier lines' }));
    expect(await screen.findByText('add laboratory')).toBeVisible();
    expect(screen.getByText('pull lot')).toBeVisible();
    expect(screen.queryByRole('button', { name: 'Earlier lines' })).toBeNull();
  });
});
