import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { openRoutes } from '#tests/helpers/open-routes.tsx';
import { noAbilities, sampleDeal } from '#tests/helpers/sample-deal.ts';
import * as dealRoute from '../../../routes/deal.tsx';
import * as returnRoute from '../../../routes/payment-return.tsx';

const URL = '/api/v1/deals/D-81QX2A';
type Standing = { state: string; payment: string };

/** The provider's answers one after the other; the last one stands. */
function provider(...answers: (Standing | Response)[]) {
  let asked = 0;
  apiServer.use(
    http.post(`${URL}/payment/refresh`, () => {
      const answer = answers[Math.min(asked, answers.length - 1)];
      asked += 1;
      return answer instanceof Response ? answer.clone() : HttpResponse.json(answer);
    }),
  );
  return () => asked;
}

function open(address: string) {
  return openRoutes(
    [
      { path: '/deals/:code', ...dealRoute },
      { path: '/deals/:code/payment', ...returnRoute },
    ],
    address,
  );
}

beforeEach(() => {
  apiServer.use(http.get(URL, () => HttpResponse.json(sampleDeal())));
});
afterEach(() => vi.useRealTimers());

describe('the return from the payment page', () => {
  it('asks the provider instead of believing the address, and shows what is held', async () => {
    const asked = provider({ state: 'funded', payment: 'paid' });
    const router = open('/deals/D-81QX2A?payment=returned');
    expect(await screen.findByText(/US\$.4,121.35 is held in escrow/)).toBeVisible();
    expect(screen.getByText(/proves nothing: we ask the provider/)).toBeVisible();
    expect(router.state.location.pathname).toBe('/deals/D-81QX2A/payment');
    expect(asked()).toBe(1);
    expect(screen.getByRole('link', { name: 'Open the deal' })).toHaveAttribute('href', '/deals/D-81QX2A');
    expect(screen.queryByRole('button', { name: /^Pay/ })).toBeNull();
  });

  it('goes on asking while the payment is open, until the provider confirms', async () => {
    vi.useFakeTimers({ shouldAdvanceTime: true });
    const asked = provider(
      { state: 'agreed', payment: 'open' },
      { state: 'agreed', payment: 'open' },
      { state: 'funded', payment: 'paid' },
    );
    open('/deals/D-81QX2A?payment=returned');
    expect(await screen.findByText('The provider has not confirmed yet')).toBeVisible();
    await vi.advanceTimersByTimeAsync(3_100);
    await vi.advanceTimersByTimeAsync(3_100);
    expect(await screen.findByText(/is held in escrow/)).toBeVisible();
    expect(asked()).toBe(3);
  });

  it('says that nothing is held after turning back, and offers to pay', async () => {
    const asked = provider({ state: 'agreed', payment: 'open' });
    open('/deals/D-81QX2A?payment=stopped');
    expect(await screen.findByText('Not paid yet')).toBeVisible();
    expect(screen.getByText(/Nothing was taken and nothing is held/)).toBeVisible();
    expect(screen.getByRole('button', { name: /^Pay US\$.4,121.35 into escrow$/ })).toBeEnabled();
    expect(asked()).toBe(1);
  });

  it('says when the provider cannot be asked, and asks again on demand', async () => {
    provider(
      HttpResponse.json(
        { code: 'payment-provider-unavailable', detail: 'The payment provider does not answer' },
        { status: 503 },
      ),
      { state: 'funded', payment: 'paid' },
    );
    open('/deals/D-81QX2A?payment=returned');
    const alert = await screen.findByRole('alert');
    expect(alert).toHaveTextContent('The payment provider does not answer');
    expect(alert).toHaveTextContent('the payment is not lost');
    await userEvent.click(screen.getByRole('button', { name: 'Ask the provider again' }));
    expect(await screen.findByText(/is held in escrow/)).toBeVisible();
  });

  it('tells a lapsed purchase and offers no payment', async () => {
    apiServer.use(
      http.get(URL, () => HttpResponse.json(sampleDeal({ state: 'lapsed', due: null, can: noAbilities }))),
    );
    provider({ state: 'lapsed', payment: 'expired' });
    open('/deals/D-81QX2A?payment=returned');
    expect(await screen.findByText('The purchase has lapsed')).toBeVisible();
    await waitFor(() => expect(screen.queryByRole('button', { name: /^Pay/ })).toBeNull());
  });
});
