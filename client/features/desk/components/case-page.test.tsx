import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { CaseAnswer, LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { apiServer } from '#tests/setup/api-server.ts';
import { Component, loader } from '../../../routes/desk-case.tsx';
import { queryClient } from '../../../lib/query-client.ts';

const ID = '018f0000-0000-7000-8000-000000000001';
const BASE = `/api/v1/desk/certificates/${ID}`;
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

const base: CaseAnswer = {
  id: ID,
  version: 3,
  state: 'claimed',
  claimedBy: 'Ines Calder',
  submittedAt: '2026-11-30T09:00:00.000Z',
  document: { url: `/api/v1/certificates/${ID}/document`, mediaType: 'image/png', name: 'report.png' },
  report: {
    laboratoryName: 'Brackwater Assay',
    laboratory,
    number: 'B-1207',
    issuedOn: '2026-11-20',
    receivedOn: null,
    testedOn: null,
    sampling: 'laboratory',
    itemDescription: 'Gold button',
    itemMass: { value: '31.20', unit: 'g' },
    itemMark: 'BW 7',
    authorisedBy: 'P. Orsino',
    results: [{ element: 'Au', finenessPermille: '995.2', uncertaintyPermille: '0.5', method: 'fire_assay' }],
  },
  lot: {
    code: 'S-2K7F4Q',
    title: 'Gold button from the bench',
    description: '',
    form: 'button',
    gross: { value: '31.20', unit: 'g' },
    contents: [],
    photos: [],
    history: [{ at: '2026-11-30T09:00:00.000Z', act: 'submitted', who: 'the seller', note: null }],
    state: 'submitted',
  },
  seller: {
    id: '018f0000-0000-7000-8000-00000000000b',
    displayName: 'Tom Wray',
    region: 'Harrow Vale',
    completedDeals: 1,
    suspendedAt: null,
  },
  comparison: [
    { label: 'Mass', onReport: '31.20 g', onLot: '31.20 g', differs: false, isByEye: false, note: null },
    { label: 'Mark', onReport: 'BW 7', onLot: 'see the photos', differs: false, isByEye: true, note: null },
    {
      label: 'Gold: fineness',
      onReport: '995.2 ‰',
      onLot: '990 ‰',
      differs: true,
      isByEye: false,
      note: 'The lot states 5.2 ‰ less than the report.',
    },
  ],
  flags: [
    { code: 'number-seen-before', message: 'This number was given for another lot.', lotCode: 'S-3M8G5R' },
  ],
  proposedGrade: 'certified',
  gaps: [],
  decision: null,
  can: { claim: false, release: true, verify: true, examine: true, return: true, pull: true, suspend: true },
};

function open(view: CaseAnswer) {
  apiServer.use(
    http.get(BASE, () => HttpResponse.json(view)),
    http.get('/api/v1/laboratories', () => HttpResponse.json({ laboratories: [laboratory] })),
  );
  const router = createMemoryRouter(
    [{ path: '/desk/certificates/:id', Component, loader, HydrateFallback: () => null }],
    { initialEntries: [`/desk/certificates/${ID}`] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
}

/** Answers an act and keeps what was sent. */
function answerAct(act: string, answer: () => Response): { sent: unknown[] } {
  const sent: unknown[] = [];
  apiServer.use(
    http.post(`${BASE}/${act}`, async ({ request }) => {
      sent.push(await request.json());
      return answer();
    }),
  );
  return { sent };
}

beforeEach(() => {
  queryClient.clear();
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  apiServer.use(http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member: null })));
});

const choose = async (name: RegExp) => userEvent.click(await screen.findByRole('radio', { name }));

describe('the case page', () => {
  it('shows the document beside the entered values, marks differences by word and lists the flags', async () => {
    open(base);
    expect(await screen.findByRole('heading', { level: 1, name: base.lot.title })).toBeVisible();
    expect(screen.getByRole('img', { name: /report as uploaded/ })).toHaveAttribute('src', base.document.url);
    expect(screen.getByText(/1 of 3 lines differ. 1 can only be compared by eye./)).toBeVisible();
    const table = screen.getByRole('table');
    expect(within(table).getAllByText('differs')).toHaveLength(1);
    expect(within(table).getAllByText('agrees')).toHaveLength(1);
    expect(within(table).getAllByText('look yourself')).toHaveLength(1);
    expect(within(table).getByText(/5.2 ‰ less than the report/)).toBeVisible();
    expect(screen.getByRole('link', { name: 'See lot S-3M8G5R' })).toHaveAttribute('href', '/lots/S-3M8G5R');
  });

  it('shows a PDF in a frame of the page, with a way to open it alone', async () => {
    open({ ...base, document: { ...base.document, mediaType: 'application/pdf', name: 'report.pdf' } });
    expect(await screen.findByTitle('The report as uploaded: report.pdf')).toHaveAttribute(
      'src',
      base.document.url,
    );
    expect(screen.getByRole('link', { name: /Open report.pdf/ })).toHaveAttribute('href', base.document.url);
  });

  it('enlarges an image by buttons and says how much', async () => {
    open(base);
    expect(await screen.findByText('100 %')).toBeVisible();
    expect(screen.getByRole('button', { name: 'Smaller' })).toBeDisabled();
    await userEvent.click(screen.getByRole('button', { name: 'Larger' }));
    expect(screen.getByText('150 %')).toBeVisible();
    expect(screen.getByRole('img', { name: /report as uploaded/ })).toHaveStyle({ width: '150%' });
  });

  it('asks for everything that a verification needs, all at once', async () => {
    const { sent } = answerAct('verify', () => HttpResponse.json(base));
    open({ ...base, report: { ...base.report, laboratory: null } });
    await choose(/^Verify$/);
    await userEvent.click(screen.getByRole('button', { name: 'Verify the certificate' }));
    const summary = await screen.findByRole('alert');
    expect(within(summary).getAllByRole('link')).toHaveLength(4);
    expect(screen.getByLabelText('How was it confirmed?')).toBeInvalid();
    expect(sent).toEqual([]);
  });

  it('restates a verification before it sends what was typed, with the version looked at', async () => {
    const verified: CaseAnswer = {
      ...base,
      version: 4,
      state: 'verified',
      lot: { ...base.lot, state: 'open' },
      can: { ...base.can, release: false, verify: false, examine: false, return: false },
    };
    const { sent } = answerAct('verify', () => HttpResponse.json(verified));
    open(base);
    await choose(/^Verify$/);
    await userEvent.type(screen.getByLabelText('How was it confirmed?'), 'By telephone');
    await userEvent.type(screen.getByLabelText('With whom?'), 'P. Orsino');
    await userEvent.type(screen.getByLabelText('On which day?'), '2026-11-30');
    await userEvent.click(screen.getByRole('checkbox', { name: /I see the mark “BW 7”/ }));
    await userEvent.click(screen.getByRole('button', { name: 'Verify the certificate' }));
    expect(sent).toEqual([]);
    const panel = screen.getByRole('region', { name: 'Confirm' });
    expect(panel).toHaveTextContent('Tom Wray, lot S-2K7F4Q');
    await userEvent.click(within(panel).getByRole('button', { name: 'Verify report B-1207' }));
    await waitFor(() => expect(screen.queryByRole('heading', { name: 'Deciding' })).toBeNull());
    expect(sent).toEqual([
      {
        version: 3,
        laboratoryId: laboratory.id,
        confirmedHow: 'By telephone',
        confirmedWith: 'P. Orsino',
        confirmedOn: '2026-11-30',
        isMarkSeen: true,
      },
    ]);
  });

  it('shows a refusal in place, keeps the text, and asks for the case again', async () => {
    answerAct('return', () =>
      HttpResponse.json(
        { code: 'version-conflict', title: 'It was changed elsewhere in the meantime' },
        { status: 412 },
      ),
    );
    open(base);
    await choose(/^Return to the seller$/);
    const reason = 'The report is cut off at the foot.';
    await userEvent.type(screen.getByLabelText('Reason for the seller'), reason);
    let reads = 0;
    apiServer.use(
      http.get(BASE, () => {
        reads += 1;
        return HttpResponse.json({ ...base, version: 4 });
      }),
    );
    await userEvent.click(screen.getByRole('button', { name: 'Return the lot' }));
    await userEvent.click(screen.getByRole('button', { name: 'Return lot S-2K7F4Q' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('changed elsewhere');
    await waitFor(() => expect(reads).toBe(1));
    expect(screen.getByLabelText('Reason for the seller')).toHaveValue(reason);
  });

  it('offers a claim first, and says who was quicker', async () => {
    const waiting: CaseAnswer = {
      ...base,
      state: 'submitted',
      claimedBy: null,
      can: { ...base.can, claim: true, release: false, verify: false, examine: false, return: false },
    };
    answerAct('claim', () =>
      HttpResponse.json(
        { code: 'certificate-claimed', title: 'A colleague has claimed this certificate' },
        { status: 409 },
      ),
    );
    open(waiting);
    expect(await screen.findByRole('button', { name: 'Claim this case' })).toBeVisible();
    expect(screen.queryByRole('radio')).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Claim this case' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('A colleague has claimed this certificate');
  });
});
