import { QueryClientProvider } from '@tanstack/react-query';
import { configure, fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { lotDraft, type LotAnswer, type LotDraft } from '#shared/schemas/lots.ts';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { apiServer } from '#tests/setup/api-server.ts';
import { rememberCsrfToken } from '../../../lib/api-client.ts';
import { ownLotQuery } from '../../../lib/lots.ts';
import { createQueryClient } from '../../../lib/query-client.ts';
import { sessionQuery } from '../../../lib/session.ts';
import { CertificateSection } from '../../evidence/components/certificate-section.tsx';
import { PhotoSection } from '../../evidence/components/photo-section.tsx';
import { DraftEditor } from './draft-editor.tsx';

// The whole form is rendered each time, and names of controls are computed over all of it.
vi.setConfig({ testTimeout: 20_000 });
configure({ asyncUtilTimeout: 5_000 });

const CODE = 'S-7K2QXA';
const LAB = '0193a1f0-0000-7000-8000-0000000000aa';

const blank = lotDraft.parse({});
const complete: LotDraft = lotDraft.parse({
  form: 'button',
  title: 'Gold button, cone mould',
  gross: { value: '12.34', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
  contents: [
    {
      metal: 'Au',
      fineness: { value: '916.7', unit: 'permille' },
      uncertainty: { value: '0.5', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
  ],
  price: '700.00',
  shipping: '20.00',
  destinations: ['US'],
  certificate: {
    fileId: '0193a1f0-0000-7000-8000-000000000001',
    fileName: 'report.pdf',
    laboratoryName: 'Tarn Assay House',
    number: 'TA-26-118',
    issuedOn: '2026-11-20',
    sampling: 'laboratory',
    itemMass: { value: '12.34', unit: 'g' },
    results: [{ element: 'Au', fineness: { value: '916.7', unit: 'permille' }, method: 'fire_assay' }],
  },
  confirmsCautions: true,
  confirmsTitle: true,
});

const nothingAllowed: LotAnswer['can'] = {
  edit: false,
  submit: false,
  redraft: false,
  changePrice: false,
  withdraw: false,
  pause: false,
  reopen: false,
  copy: false,
  buy: false,
  fixPrice: false,
  giveUpFix: false,
  pull: false,
};

function lotAnswer(draft: LotDraft, version: number, part: Partial<LotAnswer> = {}): LotAnswer {
  return {
    code: CODE,
    state: 'draft',
    version,
    form: null,
    title: draft.title,
    description: '',
    region: 'Harrow Vale',
    isMine: true,
    seller: { region: 'Harrow Vale', completedDeals: 0 },
    gross: null,
    readability: null,
    contents: [],
    evidenceGrade: 'declared',
    certificate: null,
    pricingBasis: 'outright',
    price: null,
    linkedPercent: null,
    floorPercent: null,
    priceWait: null,
    priceFix: null,
    shipping: null,
    destinations: [],
    closesAt: null,
    openedAt: null,
    photos: [],
    sheet: null,
    sellerSheet: null,
    nets: [],
    quoteState: 'fresh',
    stateReason: null,
    history: [],
    dealCode: null,
    draft,
    can: { ...nothingAllowed, edit: true, submit: true },
    ...part,
  };
}

const member: MemberAnswer = {
  id: '0193a1f0-0000-7000-8000-0000000000bb',
  email: 'wren@bench.example',
  displayName: 'Wren',
  role: 'member',
  region: 'Harrow Vale',
  weightUnit: 'g',
  timeZone: 'UTC',
  suspendedAt: null,
  suspensionReason: null,
  payouts: { state: 'ready', requirements: [] },
  can: { sell: true, useDesk: false },
};

/** 2000 US$ per troy ounce, so that 12.34 g at 916.7 ‰ come to 727.38 (the worked example of the valuation API). */
const quotes = (isFresh: boolean) => ({
  now: '2026-12-01T12:00:00.000Z',
  state: isFresh ? 'fresh' : 'stale',
  marketUntil: null,
  staleAfterSeconds: 300,
  quotes: [
    {
      id: '1',
      metal: 'Au',
      usdPerTroyOunce: '2000.00',
      at: '2026-12-01T12:00:00.000Z',
      acceptedAt: '2026-12-01T12:00:01.000Z',
      source: 'test',
      ageSeconds: 1,
      isFresh,
      isQuarantined: false,
    },
  ],
});

const fees = {
  rates: [
    {
      method: 'card',
      percent: '4',
      minimum: { currency: 'USD', amount: '2.00' },
      validFrom: '2026-01-01T00:00:00.000Z',
    },
    {
      method: 'bank_debit',
      percent: '1.5',
      minimum: { currency: 'USD', amount: '2.00' },
      validFrom: '2026-01-01T00:00:00.000Z',
    },
  ],
};

type SaveBody = { draft: LotDraft; version: number };
let saves: SaveBody[];

function answerSaves() {
  return http.put(`/api/v1/lots/${CODE}/draft`, async ({ request }) => {
    const body = (await request.json()) as SaveBody;
    saves.push(body);
    return HttpResponse.json(lotAnswer(body.draft, body.version + 1));
  });
}

const problem = (status: number, body: object) =>
  HttpResponse.json(body, { status, headers: { 'content-type': 'application/problem+json' } });

function open(draft: LotDraft, { canSell = true, onSubmitted = vi.fn() } = {}) {
  const client = createQueryClient();
  const lot = lotAnswer(draft, 3);
  client.setQueryData(ownLotQuery(CODE).queryKey, lot);
  client.setQueryData(sessionQuery.queryKey, {
    csrfToken: 't',
    member: { ...member, can: { ...member.can, sell: canSell } },
  });
  const evidence = (
    <>
      <PhotoSection />
      <CertificateSection />
    </>
  );
  const element = <DraftEditor lot={lot} draft={draft} evidence={evidence} onSubmitted={onSubmitted} />;
  const router = createMemoryRouter([
    { path: '/', element },
    { path: '/elsewhere', element: <p>Elsewhere</p> },
  ]);
  render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { router, onSubmitted };
}

const field = (name: string) => screen.getByLabelText(name);
/** One change instead of a stroke for each letter: the form is large and the figures follow either way. */
const type = (element: HTMLElement, value: string) => fireEvent.change(element, { target: { value } });
function typeAndLeave(element: HTMLElement, value: string) {
  element.focus();
  type(element, value);
  fireEvent.blur(element);
}

beforeEach(() => {
  rememberCsrfToken('t');
  saves = [];
  URL.createObjectURL = vi.fn(() => 'blob:preview');
  URL.revokeObjectURL = vi.fn();
  apiServer.use(
    http.get('/api/v1/quotes', () => HttpResponse.json(quotes(true))),
    http.get('/api/v1/fee-schedule', () => HttpResponse.json(fees)),
    http.get('/api/v1/me/lots', () => HttpResponse.json({ lots: [] })),
    http.get('/api/v1/laboratories', () =>
      HttpResponse.json({
        laboratories: [
          {
            id: LAB,
            name: 'Orrin Assay Rooms',
            accreditationBody: 'VAB',
            accreditationNumber: '4471',
            scope: 'Au, Ag',
            region: 'Vale',
            contact: '',
            validUntil: '2028-01-01',
            isActive: true,
          },
        ],
      }),
    ),
    answerSaves(),
  );
});

describe('the sheet beside the form', () => {
  it('follows what is typed, with the net for each payment method', async () => {
    open({ ...complete, gross: { value: '', unit: 'g' }, price: '', confirmsTitle: false });
    const beside = screen.getByRole('region', { name: 'What it comes to' });
    expect(await within(beside).findByText(/Enter the gross mass, a metal that is paid for/)).toBeVisible();
    type(field('Gross mass'), '12.34');
    expect((await within(beside).findAllByText('727.38')).length).toBeGreaterThan(0);
    expect(field('Gross mass')).toHaveAccessibleDescription(/0\.396740.oz t/);
    type(field('Price of the metal, US$'), '700');
    // 700.00 − 4 % + 20.00, and 700.00 − 1.5 % + 20.00.
    const nets = await within(beside).findByRole('table', { name: /To you, by how the buyer pays/ });
    expect(within(nets).getByText('692.00')).toBeVisible();
    expect(within(nets).getByText('709.50')).toBeVisible();
    expect(within(beside).getByRole('img', { name: /price 96\.24.% of melt/ })).toBeVisible();
    // 24.68 × 0.9167 ÷ 31.1034768 = 0.727384 oz t; × 2000.00.
    type(field('Gross mass'), '24.68');
    expect((await within(beside).findAllByText('1,454.77')).length).toBeGreaterThan(0);
  });

  it('is repeated in a line over the buttons, which leads to it', async () => {
    open({ ...complete, gross: { value: '12.34', unit: 'g' }, price: '700' });
    const line = await screen.findByRole('link', {
      name: /^Estimate: US\$.692\.00 to you · 96\.24.% of melt$/,
    });
    window.HTMLElement.prototype.scrollIntoView = vi.fn();
    await userEvent.click(line);
    expect(screen.getByRole('heading', { name: 'What it comes to' })).toHaveFocus();
  });

  it('says that figures rest on an old quote', async () => {
    apiServer.use(http.get('/api/v1/quotes', () => HttpResponse.json(quotes(false))));
    open(complete);
    expect(await screen.findByText('There is no fresh quote')).toBeVisible();
    expect(screen.getByText(/Figures rest on the last accepted quote/)).toBeVisible();
  });
});

describe('a slip', () => {
  it.each([
    ['Gross mass', '0', /must be above 0/],
    ['Gross mass', '-3', /must be above 0/],
    ['Gross mass', '1000000000', /at most 1000 kg/],
    ['Gross mass', '1.123456789012345', /at most 6 digits after the dot/],
    ['Gross mass', '1,234', /Is 1,234 1\.234 or 1234\?/],
    ['Fineness', '0', /must be above zero/],
    ['Fineness', '1000.1', /Pure metal is 1000 ‰/],
    ['Price of the metal, US$', '19.99', /The lowest price is US\$ 20\.00/],
  ])('in %s, "%s", is told at its field once it is left', async (name, value, words) => {
    open({ ...complete, certificate: { ...complete.certificate, results: [] } });
    const control = field(name);
    expect(control).toBeValid();
    typeAndLeave(control, value);
    await waitFor(() => expect(control).toBeInvalid());
    expect(control).toHaveAccessibleDescription(words);
  });

  it('takes a decimal comma that can mean one thing only', async () => {
    open({ ...complete, gross: { value: '', unit: 'g' } });
    typeAndLeave(field('Gross mass'), '12,34');
    const beside = screen.getByRole('region', { name: 'What it comes to' });
    expect((await within(beside).findAllByText('727.38')).length).toBeGreaterThan(0);
    expect(field('Gross mass')).toBeValid();
  });

  it('tells of 25 karat and of more than the whole', async () => {
    const gold = complete.contents[0]!;
    const silver = { ...gold, metal: 'Ag', fineness: { value: '100', unit: 'permille' } };
    open({
      ...complete,
      contents: [gold, silver],
      certificate: { ...complete.certificate, results: [] },
    });
    const [first, second] = screen.getAllByLabelText('Fineness');
    typeAndLeave(second!, '100.5');
    const assay = screen.getByRole('group', { name: 'Metals and elements' });
    await waitFor(() => expect(assay).toHaveAccessibleDescription(/1000/));
    fireEvent.change(screen.getByLabelText('Unit of the fineness, Gold'), {
      target: { value: 'karat' },
    });
    typeAndLeave(first!, '25');
    await waitFor(() => expect(first).toHaveAccessibleDescription(/Pure metal is 24 karat/));
  });
});

describe('handing in', () => {
  it('shows all that is missing at once, each linked to its field, and sends nothing', async () => {
    open(blank);
    await userEvent.click(screen.getByText('Hand the lot to the desk'));
    const summary = (await screen.findByText(/things need another look/)).closest('div')!;
    const links = within(summary).getAllByRole('link');
    for (const words of [
      'Choose button, bar or grain.',
      'Enter the gross mass.',
      'Enter the fineness.',
      'Upload the certificate.',
      'Enter a price.',
      'Choose at least one country that you ship to.',
      'Confirm that the metal is yours to sell.',
    ]) {
      expect(
        links.some((link) => link.textContent === words),
        words,
      ).toBe(true);
    }
    for (const link of links) {
      expect(document.getElementById(link.getAttribute('href')!.slice(1)), link.textContent).not.toBeNull();
    }
    expect(document.title).toMatch(/^Error: /);
    await userEvent.click(within(summary).getByRole('link', { name: 'Enter the gross mass.' }));
    expect(field('Gross mass')).toHaveFocus();
  });

  it('asks, saves what is not saved, and hands in', async () => {
    apiServer.use(
      http.post(`/api/v1/lots/${CODE}/submit`, () =>
        HttpResponse.json(lotAnswer(complete, 5, { state: 'submitted', draft: null, can: nothingAllowed })),
      ),
    );
    const { onSubmitted } = open(complete);
    type(field('Price of the metal, US$'), '710.00');
    await userEvent.click(screen.getByText('Hand the lot to the desk'));
    expect(await screen.findByRole('region', { name: 'Confirm' })).toHaveTextContent('710.00');
    await userEvent.click(screen.getByRole('button', { name: 'Hand it to the desk' }));
    await waitFor(() => expect(onSubmitted).toHaveBeenCalledTimes(1));
    expect(saves.map(({ version, draft }) => [version, draft.price])).toEqual([[3, '710.00']]);
  });

  it('puts what only the server knows at its field: the certificate of another live lot', async () => {
    apiServer.use(
      http.post(`/api/v1/lots/${CODE}/submit`, () =>
        problem(409, {
          code: 'certificate-in-use',
          detail: 'Another live lot stands on this certificate.',
          errors: [
            {
              pointer: '/certificate/number',
              code: 'certificate-in-use',
              message: 'Another live lot stands on this certificate.',
            },
          ],
        }),
      ),
    );
    open(complete);
    await userEvent.click(screen.getByText('Hand the lot to the desk'));
    await userEvent.click(await screen.findByRole('button', { name: 'Hand it to the desk' }));
    await waitFor(() => expect(field('Report number')).toBeInvalid());
    expect(field('Report number')).toHaveAccessibleDescription(/Another live lot/);
    type(field('Report number'), 'TA-26-119');
    await waitFor(() => expect(field('Report number')).toBeValid());
  });

  it('leads to payout onboarding when selling is not open yet', async () => {
    open(complete, { canSell: false });
    expect(screen.getByText('Selling opens after payout onboarding')).toBeVisible();
    expect(screen.getByRole('link', { name: 'Set up payouts on the account page' })).toHaveAttribute(
      'href',
      '/account',
    );
    await userEvent.click(screen.getByText('Hand the lot to the desk'));
    expect(await screen.findByText('One thing needs another look')).toBeVisible();
  });
});

describe('the certificate', () => {
  it('takes laboratory from the register and the results from the lot', async () => {
    open({ ...complete, certificate: { ...complete.certificate, results: [] } });
    await screen.findByText('Orrin Assay Rooms, Vale');
    fireEvent.change(screen.getByLabelText('Laboratory'), { target: { value: LAB } });
    await userEvent.click(screen.getByText('Same results as the lot'));
    await userEvent.click(screen.getByText('Save the draft'));
    await waitFor(() => expect(saves).toHaveLength(1));
    expect(saves[0]?.draft.certificate).toMatchObject({
      laboratoryId: LAB,
      laboratoryName: 'Orrin Assay Rooms',
      results: [{ element: 'Au', fineness: { value: '916.7', unit: 'permille' }, method: 'fire_assay' }],
    });
  });
});

describe('photos', () => {
  const photo = (size: number, name: string) => {
    const file = new File(['x'], name, { type: 'image/jpeg' });
    Object.defineProperty(file, 'size', { value: size });
    return file;
  };

  it('keeps a refused photo on the list with its reason, and takes the others', async () => {
    let uploads = 0;
    apiServer.use(
      http.post(`/api/v1/lots/${CODE}/photos`, () => {
        uploads += 1;
        if (uploads === 1)
          return problem(415, { code: 'photo-not-an-image', detail: 'This is not a photo that can be read' });
        const at = (size: number) => `/api/v1/photos/p1/${size}`;
        const taken = { id: 'p1', caption: '', isDrawing: false, width: 10, height: 10 };
        return HttpResponse.json(
          { ...taken, thumb: at(240), medium: at(960), large: at(2000) },
          { status: 201 },
        );
      }),
    );
    open(complete);
    const files = [photo(900, 'drawing.jpg'), photo(31_457_280, 'huge.jpg'), photo(900, 'button.jpg')];
    fireEvent.change(screen.getByLabelText('Photos to add'), { target: { files } });
    expect(await screen.findByText(/drawing\.jpg: This is not a photo that can be read/)).toBeVisible();
    expect(screen.getByText(/huge\.jpg: The photo is too large: at most 15 MB/)).toBeVisible();
    expect(await screen.findByRole('list', { name: 'Photos of the lot' })).toBeVisible();
    expect(uploads).toBe(2);
    await userEvent.click(screen.getByRole('button', { name: 'Leave huge.jpg out' }));
    expect(screen.queryByText(/huge\.jpg/)).toBeNull();
  });
});

describe('saving', () => {
  it('saves by itself a few seconds after typing stops, and says when', async () => {
    open(complete);
    vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
    try {
      type(field('Title'), 'Gold button, second melt');
      expect(screen.getByText(/not saved yet/)).toBeVisible();
      await vi.advanceTimersByTimeAsync(3_100);
    } finally {
      vi.useRealTimers();
    }
    await waitFor(() => expect(saves.map(({ draft }) => draft.title)).toEqual(['Gold button, second melt']));
    expect(await screen.findByText(/^saved/)).toHaveTextContent(/saved \d\d:\d\d/);
  });

  const theirs = { ...complete, title: 'Typed elsewhere' };
  function conflictOnce() {
    apiServer.use(
      http.put(
        `/api/v1/lots/${CODE}/draft`,
        () => problem(412, { code: 'version-conflict', detail: 'It was changed elsewhere in the meantime' }),
        { once: true },
      ),
      http.get(`/api/v1/lots/${CODE}`, () => HttpResponse.json(lotAnswer(theirs, 9))),
    );
  }

  it('offers to keep mine when another window saved first, and saves it on the new version', async () => {
    conflictOnce();
    open(complete);
    type(field('Title'), 'Typed here');
    await userEvent.click(screen.getByText('Save the draft'));
    expect(await screen.findByRole('alert')).toHaveTextContent('They differ in: title.');
    expect(field('Title')).toHaveValue('Typed here');
    await userEvent.click(screen.getByRole('button', { name: /^Keep mine/ }));
    await waitFor(() =>
      expect(saves.map(({ version, draft }) => [version, draft.title])).toEqual([[9, 'Typed here']]),
    );
    expect(screen.queryByText(/changed elsewhere/)).toBeNull();
  });

  it('offers to take theirs', async () => {
    conflictOnce();
    open(complete);
    type(field('Title'), 'Typed here');
    await userEvent.click(screen.getByText('Save the draft'));
    await userEvent.click(await screen.findByRole('button', { name: /^Take theirs/ }));
    expect(field('Title')).toHaveValue('Typed elsewhere');
    expect(saves).toEqual([]);
  });

  it('saves before the page is left, and asks where that fails', async () => {
    const { router } = open(complete);
    type(field('Title'), 'Typed and left');
    apiServer.use(http.put(`/api/v1/lots/${CODE}/draft`, () => HttpResponse.error(), { once: true }));
    await router.navigate('/elsewhere');
    expect(await screen.findByText('The draft is not saved yet')).toBeVisible();
    await userEvent.click(screen.getByText('Stay on this page'));
    expect(field('Title')).toHaveValue('Typed and left');
    await router.navigate('/elsewhere');
    expect(await screen.findByText('Elsewhere')).toBeVisible();
    expect(saves.map(({ draft }) => draft.title)).toEqual(['Typed and left']);
  });
});
