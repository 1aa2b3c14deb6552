import { cleanup, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { openRoutes } from '#tests/helpers/open-routes.tsx';
import { noAbilities, sampleDeal } from '#tests/helpers/sample-deal.ts';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { leaveTo } from '../../../lib/leave-to.ts';
import { Component, loader } from '../../../routes/deal.tsx';

vi.mock('../../../lib/leave-to.ts', () => ({ leaveTo: vi.fn() }));

const URL = '/api/v1/deals/D-81QX2A';
const usd = (amount: string) => ({ currency: 'USD' as const, amount });
const held = usd('4121.35');

async function open(deal: DealAnswer) {
  apiServer.use(http.get(URL, () => HttpResponse.json(deal)));
  openRoutes([{ path: '/deals/:code', loader, Component }], '/deals/D-81QX2A');
  await screen.findByRole('heading', { level: 1 });
}

const problem = (status: number, code: string, detail: string, errors?: object[]) =>
  HttpResponse.json(
    { code, detail, title: detail, status, errors },
    { status, headers: { 'content-type': 'application/problem+json' } },
  );

const buttons = () =>
  within(screen.getByRole('region', { name: 'Register of the deal' }))
    .queryAllByRole('button')
    .map((button) => button.textContent);

const delivered = (changes: Partial<DealAnswer> = {}) =>
  sampleDeal({
    state: 'delivered',
    held,
    due: {
      who: 'buyer',
      act: 'Weigh it and record the mass',
      at: '2026-12-11T11:20:00.000Z',
      silence: 'Nothing is accepted by silence.',
    },
    can: { ...noAbilities, recordReceipt: true, contest: true },
    ...changes,
  });

// jsdom has no object URLs.
Object.assign(globalThis.URL, { createObjectURL: () => 'blob:preview', revokeObjectURL: () => undefined });

beforeEach(() => vi.mocked(leaveTo).mockClear());

describe('the deal page', () => {
  it('shows the book, what is due and what silence means', async () => {
    await open(sampleDeal());
    expect(screen.getByRole('heading', { level: 1 })).toHaveTextContent(
      'Deal D-81QX2A, Gold button, cone mould',
    );
    expect(screen.getByText('Bought at the asked price; quote and terms fixed')).toBeVisible();
    const due = screen.getByRole('region', { name: 'Due next' });
    expect(due).toHaveTextContent(/Pay into escrow by Tue 1 Dec, 14:40/);
    expect(due).toHaveTextContent('the purchase lapses');
    expect(screen.getByRole('link', { name: 'Provisional sheet as PDF' })).toHaveAttribute(
      'href',
      `${URL}/sheet.pdf`,
    );
    expect(screen.queryByRole('link', { name: /certificate/ })).toBeNull();
  });

  it.each([
    ['nothing', noAbilities, []],
    ['paying', { ...noAbilities, pay: true }, ['Pay US$ 4,121.35 into escrow']],
    ['shipping', { ...noAbilities, ship: true }, ['Enter the parcel you shipped']],
    ['an unsigned delivery', { ...noAbilities, confirmDelivery: true }, ['Confirm the delivery']],
    [
      'weighing or contesting',
      { ...noAbilities, recordReceipt: true, contest: true },
      ['Record the received mass', 'Contest'],
    ],
    [
      'accepting or contesting',
      { ...noAbilities, accept: true, contest: true },
      ['Accept: US$ 4,121.35 to the seller', 'Contest'],
    ],
    [
      'ruling or freezing',
      { ...noAbilities, rule: true, freeze: true },
      ['Rule on the deal', 'Freeze the deal'],
    ],
    ['lifting a freeze', { ...noAbilities, unfreeze: true }, ['Lift the freeze']],
  ] as const)('offers what the answer allows and nothing else: %s', async (_, can, expected) => {
    await open(sampleDeal({ held, can }));
    expect(buttons().map((text) => text?.replaceAll('\u00a0', ' '))).toEqual(expected);
  });

  it('restates sum and counterparty before paying, and keeps the key over a lost connection', async () => {
    const keys: (string | null)[] = [];
    apiServer.use(
      http.post(`${URL}/payment`, ({ request }) => {
        keys.push(request.headers.get('idempotency-key'));
        return keys.length === 1
          ? HttpResponse.error()
          : HttpResponse.json({ url: 'https://pay.example/1', expiresAt: '2026-12-01T14:40:00Z' });
      }),
    );
    await open(sampleDeal());
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: /^Pay/ }));
    const confirm = screen.getByRole('region', { name: 'Confirm' });
    expect(confirm).toHaveTextContent('4,121.35');
    expect(confirm).toHaveTextContent('Ines Marlow, Harrow Vale');
    await user.click(within(confirm).getByRole('button', { name: /^Pay/ }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Check your connection');
    await user.click(within(confirm).getByRole('button', { name: /^Pay/ }));
    await waitFor(() => expect(leaveTo).toHaveBeenCalledWith('https://pay.example/1'));
    // What the server takes for a key: 8 to 255 visible characters.
    expect(keys[0]).toMatch(/^[\x21-\x7e]{8,255}$/);
    expect(keys[1]).toBe(keys[0]);
  });

  it('puts the refusal of too little insurance at its field and loses nothing typed', async () => {
    const sent: unknown[] = [];
    apiServer.use(
      http.post(`${URL}/ship`, async ({ request }) => {
        sent.push(await request.json());
        return problem(422, 'invalid-input', 'Some fields need another value', [
          {
            pointer: '/insuredValue',
            code: 'insured-too-low',
            message: 'Insure it for US$ 4093.35 at least',
          },
        ]);
      }),
    );
    await open(sampleDeal({ side: 'seller', state: 'funded', held, can: { ...noAbilities, ship: true } }));
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: 'Enter the parcel you shipped' }));
    const insured = screen.getByRole('textbox', { name: 'Insured value' });
    expect(insured).toHaveValue('4093.35');
    await user.click(screen.getByRole('button', { name: 'Tell the buyer it is shipped' }));
    expect(screen.getByRole('textbox', { name: 'Carrier' })).toHaveAccessibleDescription('Write the carrier');
    expect(sent).toEqual([]);
    await user.type(screen.getByRole('textbox', { name: 'Carrier' }), 'Vale Post');
    await user.type(screen.getByRole('textbox', { name: 'Tracking number' }), 'VP0044192');
    await user.clear(insured);
    await user.type(insured, '100,50');
    await user.click(screen.getByRole('button', { name: 'Tell the buyer it is shipped' }));
    await waitFor(() => expect(insured).toHaveAccessibleDescription(/Insure it for US\$ 4093.35 at least/));
    expect(sent).toEqual([{ carrier: 'Vale Post', trackingNumber: 'VP0044192', insuredValue: '100.50' }]);
    expect(screen.getByRole('textbox', { name: 'Carrier' })).toHaveValue('Vale Post');
  });

  it('records the received mass as typed and says whether the scales agree', async () => {
    const fileId = '0193ad1c-77d0-7e0b-9f5a-1c2ba87298d8';
    const receipt = {
      mass: { value: '31.019', unit: 'g' },
      differenceGrams: '-0.005',
      isWithinScales: false,
      at: '2026-12-06T12:00:00.000Z',
      photoUrl: `${URL}/receipt-photo/2000`,
      photoThumb: `${URL}/receipt-photo/240`,
    };
    let sent: unknown;
    const photos: number[] = [];
    apiServer.use(
      http.post(`${URL}/receipt-photo`, async ({ request }) => {
        photos.push((await request.arrayBuffer()).byteLength);
        return photos.length === 1
          ? problem(415, 'photo-not-an-image', 'This is not a photo that can be read')
          : HttpResponse.json({ fileId }, { status: 201 });
      }),
      http.post(`${URL}/receipt`, async ({ request }) => {
        sent = await request.json();
        return HttpResponse.json(
          delivered({ receipt, can: { ...noAbilities, accept: true, contest: true } }),
        );
      }),
    );
    await open(delivered());
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: 'Record the received mass' }));
    const mass = screen.getByRole('textbox', { name: 'Received mass' });
    await user.type(mass, '1,234');
    await user.click(screen.getByRole('button', { name: 'Record this mass' }));
    expect(mass).toHaveAccessibleDescription(/Write it with a dot, or without the comma/);
    await user.clear(mass);
    await user.type(mass, '31.023');
    const form = within(screen.getByRole('form', { name: 'The mass you received' }));
    expect(form.getByRole('status')).toHaveTextContent(/Difference: 0\.001.g less\. The two weighings agree/);
    await user.clear(mass);
    await user.type(mass, '31.019');
    expect(form.getByRole('status')).toHaveTextContent(
      /Difference: 0\.005.g less\. The two weighings differ/,
    );
    const chooser = document.querySelector<HTMLInputElement>('input[type=file]')!;
    const button = screen.getByRole('button', { name: /^Photo of the weighing/ });
    await user.upload(chooser, new File(['no'], 'balance.jpg', { type: 'image/jpeg' }));
    await waitFor(() => expect(button).toHaveAccessibleDescription(/balance.jpg: This is not a photo/));
    await user.upload(chooser, new File(['yes'], 'display.jpg', { type: 'image/jpeg' }));
    expect(await screen.findByText('display.jpg')).toBeVisible();
    await user.click(screen.getByRole('button', { name: 'Record this mass' }));
    await user.click(
      within(screen.getByRole('region', { name: 'Confirm' })).getByRole('button', {
        name: 'Record the received mass',
      }),
    );
    expect(await screen.findByText(/differ by more than one step of each balance/)).toBeVisible();
    expect(sent).toEqual({ mass: { value: '31.019', unit: 'g' }, photoFileId: fileId });
    expect(screen.getByRole('link', { name: 'The buyer’s photo of the weighing' })).toHaveAttribute(
      'href',
      `${URL}/receipt-photo/2000`,
    );
    expect(screen.getByRole('region', { name: 'Received mass' })).toHaveTextContent('0.005 g less');
    expect(screen.getByRole('region', { name: 'Register of the deal' })).toHaveFocus();
  });

  it('names both sides for the desk and lets it take up what got no answer', async () => {
    let sent: unknown;
    apiServer.use(
      http.post('/api/v1/desk/deals/D-81QX2A/take-up', async ({ request }) => {
        sent = await request.json();
        const note = 'Asked twice, without an answer.';
        const contest = { reason: 'not_answered' as const, note, at: '2026-12-12T12:00:00.000Z' };
        return HttpResponse.json(delivered({ side: 'desk', state: 'contested', contest, can: noAbilities }));
      }),
    );
    await open(delivered({ side: 'desk', can: { ...noAbilities, takeUp: true } }));
    expect(screen.getByText(/Tomas Reeve, Dunmere, buys from Ines Marlow, Harrow Vale/)).toBeVisible();
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: 'Take up the deal' }));
    await user.click(screen.getByRole('button', { name: 'Take it up' }));
    expect(screen.getByRole('alert')).toHaveTextContent('Give both sides the reason');
    await user.type(
      screen.getByRole('textbox', { name: 'Reason for both sides' }),
      'Asked twice, without an answer.',
    );
    await user.click(screen.getByRole('button', { name: 'Take it up' }));
    const confirm = screen.getByRole('region', { name: 'Confirm' });
    expect(confirm).toHaveTextContent('4,121.35');
    await user.click(within(confirm).getByRole('button', { name: 'Take up the deal' }));
    expect(await screen.findByText(/Taken up by the desk: the buyer has not answered/)).toBeVisible();
    expect(sent).toEqual({ reason: 'Asked twice, without an answer.' });
  });

  it('shows a refused acceptance in place and reads the deal again', async () => {
    await open(delivered({ can: { ...noAbilities, accept: true } }));
    apiServer.use(
      http.post(`${URL}/accept`, () => problem(409, 'deal-frozen', 'The desk has frozen this deal')),
      http.get(URL, () => HttpResponse.json(delivered({ isFrozen: true, can: noAbilities }))),
    );
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: /^Accept/ }));
    await user.click(
      within(screen.getByRole('region', { name: 'Confirm' })).getByRole('button', { name: /^Accept/ }),
    );
    expect(await screen.findByText('The desk has frozen this deal')).toBeVisible();
    await waitFor(() => expect(buttons()).toEqual([]));
  });

  it('has a contest say what is wrong, and restates what stays held', async () => {
    let sent: unknown;
    apiServer.use(
      http.post(`${URL}/contest`, async ({ request }) => {
        sent = await request.json();
        return HttpResponse.json(
          delivered({
            state: 'contested',
            contest: {
              reason: 'wrong_mass',
              note: 'It weighs half a gram less.',
              at: '2026-12-06T12:00:00.000Z',
            },
            can: noAbilities,
          }),
        );
      }),
    );
    await open(delivered());
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: 'Contest' }));
    await user.click(screen.getByRole('button', { name: 'Contest' }));
    expect(screen.getByRole('alert')).toHaveTextContent('Choose what is wrong');
    await user.click(screen.getByRole('radio', { name: 'The mass is wrong' }));
    await user.type(
      screen.getByRole('textbox', { name: 'What did you find?' }),
      'It weighs half a gram less.',
    );
    await user.click(screen.getByRole('button', { name: 'Contest' }));
    await user.click(screen.getByRole('button', { name: /4,121.35 stays held/ }));
    expect(await screen.findByText('Contested: the mass is wrong')).toBeVisible();
    expect(sent).toEqual({ reason: 'wrong_mass', note: 'It weighs half a gram less.' });
  });

  it('restates who gets what before the desk rules', async () => {
    const sent: unknown[] = [];
    const contested = {
      state: 'contested' as const,
      side: 'desk' as const,
      held,
      commission: { percent: '4', minimum: usd('2.00'), amount: usd('163.73'), net: usd('3957.62') },
    };
    apiServer.use(
      http.post('/api/v1/desk/deals/D-81QX2A/ruling', async ({ request }) => {
        sent.push(await request.json(), request.headers.get('idempotency-key'));
        return HttpResponse.json(sampleDeal({ ...contested, state: 'settled', can: noAbilities }));
      }),
    );
    await open(sampleDeal({ ...contested, can: { ...noAbilities, rule: true } }));
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: 'Rule on the deal' }));
    await user.click(screen.getByRole('radio', { name: 'Release' }));
    await user.type(
      screen.getByRole('textbox', { name: 'Reason for both sides' }),
      'The mass agrees after all.',
    );
    await user.click(screen.getByRole('button', { name: 'Look at the ruling before it counts' }));
    const confirm = screen.getByRole('region', { name: 'Confirm' });
    expect(confirm).toHaveTextContent('3,957.62');
    expect(confirm).toHaveTextContent(/163.73 is the house’s commission/);
    await user.click(within(confirm).getByRole('button', { name: /^Rule: US\$.3,957.62 to the seller$/ }));
    await waitFor(() => expect(buttons()).toEqual([]));
    expect(sent).toEqual([
      { ruling: 'release', reason: 'The mass agrees after all.' },
      expect.stringMatching(/^[0-9a-f-]{32,}$/),
    ]);
  });

  it('tells payout and refund in words', async () => {
    await open(
      sampleDeal({
        state: 'settled',
        side: 'seller',
        can: noAbilities,
        due: null,
        payout: { state: 'failed', amount: usd('3957.62'), failureCode: 'account_closed', paidAt: null },
        refund: { state: 'succeeded', amount: held },
      }),
    );
    expect(screen.getByText(/The payout came back/)).toHaveTextContent('account closed');
    expect(screen.getByText(/Back with the buyer/)).toHaveTextContent('4,121.35');
  });

  it('promises the seller nothing once the deal was cancelled', async () => {
    const commission = { percent: '4', minimum: usd('2.00'), amount: usd('163.73'), net: usd('3957.62') };
    await open(sampleDeal({ state: 'funded', side: 'seller', held, commission, can: noAbilities }));
    expect(screen.getByRole('region', { name: 'The sums, US$' })).toHaveTextContent('Goes to you3,957.62');
    cleanup();
    await open(sampleDeal({ state: 'cancelled', side: 'seller', commission, due: null, can: noAbilities }));
    expect(screen.getByRole('region', { name: 'The sums, US$' })).not.toHaveTextContent('3,957.62');
  });
});
