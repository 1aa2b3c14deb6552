import { QueryClientProvider } from '@tanstack/react-query';
import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { refinedSheet } from '#shared/settlement/refined-sheet.ts';
import { apiServer } from '#tests/setup/api-server.ts';
import { rememberCsrfToken } from '../../../lib/api-client.ts';
import { createQueryClient } from '../../../lib/query-client.ts';
import { OwnLotPage } from './own-lot-page.tsx';

const usd = (amount: string) => ({ currency: 'USD' as const, amount });

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

/** 12.34 g at 916.7 ‰ and 2000 US$ per troy ounce: 727.38 of melt. */
const sheet = refinedSheet({
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
  quotes: [
    { id: null, metal: 'Au', usdPerTroyOunce: '2000.00', at: '2026-12-01T12:00:00.000Z', source: 'test' },
  ],
  price: { amount: '700.00' },
  shipping: { amount: '20.00' },
  commission: null,
  moment: 'estimated',
  audience: 'buyer',
});

function lotAnswer(part: Partial<LotAnswer>): LotAnswer {
  return {
    code: 'S-7K2QXA',
    state: 'open',
    version: 4,
    form: 'button',
    title: 'Gold button, cone mould',
    description: '',
    region: 'Harrow Vale',
    isMine: true,
    seller: { region: 'Harrow Vale', completedDeals: 0 },
    gross: { value: '12.34', unit: 'g', grams: '12.34' },
    readability: null,
    contents: [],
    evidenceGrade: 'certified',
    certificate: null,
    pricingBasis: 'outright',
    price: usd('700.00'),
    linkedPercent: null,
    floorPercent: null,
    priceWait: null,
    priceFix: null,
    shipping: usd('20.00'),
    destinations: ['US'],
    closesAt: null,
    openedAt: null,
    photos: [],
    sheet,
    sellerSheet: null,
    nets: [
      { method: 'card', percent: '4', minimum: usd('2.00'), commission: usd('28.00'), net: usd('692.00') },
    ],
    quoteState: 'fresh',
    stateReason: null,
    history: [],
    dealCode: null,
    draft: null,
    can: nothingAllowed,
    ...part,
  };
}

function open(lot: LotAnswer) {
  const onRedrafted = vi.fn();
  const router = createMemoryRouter([
    { path: '/', element: <OwnLotPage lot={lot} onRedrafted={onRedrafted} /> },
  ]);
  render(
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return onRedrafted;
}

beforeEach(() => rememberCsrfToken('t'));

describe('an own lot', () => {
  it('restates the new price with its share of melt before it counts', async () => {
    const sent: unknown[] = [];
    apiServer.use(
      http.post('/api/v1/lots/S-7K2QXA/price', async ({ request }) => {
        sent.push(await request.json());
        return HttpResponse.json(lotAnswer({ price: usd('720.00') }));
      }),
    );
    open(lotAnswer({ can: { ...nothingAllowed, changePrice: true } }));
    await userEvent.click(screen.getByText('Change the price'));
    const price = screen.getByLabelText('New price of the metal, US$');
    fireEvent.change(price, { target: { value: '12' } });
    await userEvent.click(screen.getByText('Go on with this price'));
    expect(price).toHaveAccessibleDescription(/The lowest price is US\$ 20\.00/);
    fireEvent.change(price, { target: { value: '720' } });
    await userEvent.click(screen.getByText('Go on with this price'));
    // 720.00 ÷ 727.38 = 98.985 %; 720.00 − 4 % + 20.00 = 711.20.
    const panel = screen.getByRole('region', { name: 'Confirm' });
    expect(panel).toHaveTextContent(/98\.99.% of melt/);
    expect(panel).toHaveTextContent(/711\.20 when paid by card/);
    expect(sent).toEqual([]);
    await userEvent.click(screen.getByText(/^Change the price to/));
    await waitFor(() => expect(sent).toEqual([{ price: '720.00' }]));
  });

  it('puts the desk’s reason on top and leads back into drafting', async () => {
    const after = lotAnswer({ state: 'draft', can: { ...nothingAllowed, edit: true } });
    apiServer.use(http.post('/api/v1/lots/S-7K2QXA/redraft', () => HttpResponse.json(after)));
    const onRedrafted = open(
      lotAnswer({
        state: 'returned',
        stateReason: 'The report number does not match.',
        can: { ...nothingAllowed, redraft: true },
      }),
    );
    expect(screen.getByText('The desk returned this lot')).toBeVisible();
    expect(screen.getByText('The report number does not match.')).toBeVisible();
    await userEvent.click(screen.getByText('Work on it again'));
    await waitFor(() => expect(onRedrafted).toHaveBeenCalledWith(after));
  });

  it('withdraws only with a reason', async () => {
    const sent: unknown[] = [];
    apiServer.use(
      http.post('/api/v1/lots/S-7K2QXA/withdraw', async ({ request }) => {
        sent.push(await request.json());
        return HttpResponse.json(lotAnswer({ state: 'withdrawn' }));
      }),
    );
    open(lotAnswer({ can: { ...nothingAllowed, withdraw: true } }));
    await userEvent.click(screen.getByText('Withdraw it'));
    await userEvent.click(screen.getByText('Withdraw the lot for good'));
    expect(screen.getByLabelText('Reason')).toHaveAccessibleDescription(/Give a reason in a few words/);
    expect(sent).toEqual([]);
    fireEvent.change(screen.getByLabelText('Reason'), { target: { value: 'Sold at the bench' } });
    await userEvent.click(screen.getByText('Withdraw the lot for good'));
    await waitFor(() => expect(sent).toEqual([{ reason: 'Sold at the bench' }]));
  });

  it('offers nothing that does not come with the lot', () => {
    open(lotAnswer({}));
    for (const act of [
      'Change the price',
      'Pause it',
      'Withdraw it',
      'Copy to a new draft',
      'Work on it again',
    ])
      expect(screen.queryByText(act)).toBeNull();
  });
});
