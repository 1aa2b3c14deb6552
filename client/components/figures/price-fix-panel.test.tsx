import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { buildLot, buildMember } from '#tests/factories/build-market-answers.ts';
import { openPage } from '#tests/helpers/open-page.tsx';

beforeEach(() => {
  vi.useFakeTimers({ toFake: ['Date'], now: new Date('2026-12-01T14:02:30.000Z') });
});
afterEach(() => vi.useRealTimers());

const linked = (change: Partial<LotAnswer>, can: Partial<LotAnswer['can']> = {}) =>
  buildLot({
    pricingBasis: 'linked',
    linkedPercent: '98.20',
    ...change,
    can: { ...buildLot().can, buy: false, ...can },
  });

function open(lot: () => LotAnswer) {
  apiServer.use(http.get('/api/v1/lots/S-2K7F0A', () => HttpResponse.json(lot())));
  return openPage('/lots/S-2K7F0A', buildMember());
}
const panel = async () => within(await screen.findByRole('region', { name: 'Price and purchase' }));

describe('a linked price', () => {
  it('is fixed by a click, stands until its time with what is left, and is given up', async () => {
    let isFixed = false;
    const until = '2026-12-01T14:12:10.000Z';
    const price = { currency: 'USD' as const, amount: '4093.35' };
    const keys: (string | null)[] = [];
    apiServer.use(
      http.post('/api/v1/lots/S-2K7F0A/price-fix', ({ request }) => {
        keys.push(request.headers.get('idempotency-key'));
        isFixed = true;
        return HttpResponse.json({ lotCode: 'S-2K7F0A', until }, { status: 201 });
      }),
      http.post('/api/v1/lots/S-2K7F0A/price-fix/give-up', () => {
        isFixed = false;
        return HttpResponse.json(linked({}));
      }),
    );
    open(() =>
      isFixed
        ? linked(
            { state: 'reserved', priceFix: { isMine: true, until, price } },
            { buy: true, giveUpFix: true },
          )
        : linked({}, { fixPrice: true }),
    );
    const user = userEvent.setup();
    const shown = await panel();
    expect(shown.getAllByText(/^linked 98.20/)[0]).toBeVisible();
    expect(shown.queryByRole('link', { name: /^Buy/ })).toBeNull();
    await user.click(shown.getByRole('button', { name: /^Fix the price now, about US\$\s4,093.35/ }));
    const status = await shown.findByText(/^Fixed for you at/);
    expect(status.parentElement).toHaveTextContent(/US\$\s4,093.35, until 14:12 \(9\smin left\)/);
    expect(keys).toEqual([expect.stringMatching(/^.{8,}$/)]);
    expect(shown.getByRole('link', { name: /^Buy: US\$\s4,121.35/ })).toBeVisible();
    await user.click(shown.getByRole('button', { name: 'Give the price fix up' }));
    await waitFor(() => expect(shown.getByRole('button', { name: /^Fix the price now/ })).toBeVisible());
  });

  it('says that it waits, and until when, while the market is closed', async () => {
    const until = '2026-12-07T09:00:00.000Z';
    open(() => linked({ quoteState: 'closed', priceWait: { reason: 'closed', until } }));
    const shown = await panel();
    expect(shown.getByRole('status')).toHaveTextContent(
      /price waits: market closed until Mon 7 Dec, 09:00\sUTC. Until then it cannot be fixed or bought/,
    );
    expect(shown.queryByRole('button', { name: /^Fix/ })).toBeNull();
  });

  it('tells others until when it is held, and never at what sum', async () => {
    const until = '2026-12-01T14:12:10.000Z';
    open(() => linked({ state: 'reserved', priceFix: { isMine: false, until, price: null } }));
    expect((await panel()).getByRole('status')).toHaveTextContent(
      'Another buyer has fixed its price until 14:12',
    );
  });

  it('says in place why it could not be fixed', async () => {
    apiServer.use(
      http.post('/api/v1/lots/S-2K7F0A/price-fix', () =>
        HttpResponse.json(
          {
            code: 'price-fix-held',
            title: 'You hold a price fix already',
            detail: 'You hold a price fix already',
          },
          { status: 409 },
        ),
      ),
    );
    open(() => linked({}, { fixPrice: true }));
    await userEvent.click((await panel()).getByRole('button', { name: /^Fix the price now/ }));
    expect(await screen.findByRole('alert')).toHaveTextContent('You hold a price fix already');
  });
});
