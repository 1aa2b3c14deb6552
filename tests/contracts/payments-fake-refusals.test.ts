import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { failureOf, startKit } from './payments-fake-kit.ts';
import type { Kit } from './payments-fake-kit.ts';

let kit: Kit;
beforeAll(async () => {
  kit = await startKit();
});
afterAll(async () => {
  // A refused request leaves no trace.
  const dump = (await (await fetch(`${kit.url}/control/dump`)).json()) as { objects: unknown[] };
  await kit.close();
  expect(dump.objects).toEqual([]);
});

describe('refusals', () => {
  const item = {
    quantity: 1,
    price_data: { currency: 'usd', unit_amount: 100, product_data: { name: 'x' } },
  };
  const session = { mode: 'payment', success_url: 'http://127.0.0.1:9/', line_items: [item] };
  const soon = (seconds: number): number => Math.floor(Date.now() / 1000) + seconds;
  const cases: Array<[string, string, object, number, string | undefined, string | undefined]> = [
    [
      'a session without success_url',
      'checkout/sessions',
      { ...session, success_url: undefined },
      400,
      'parameter_missing',
      'success_url',
    ],
    [
      'a session without line items',
      'checkout/sessions',
      { ...session, line_items: undefined },
      400,
      'parameter_missing',
      'line_items',
    ],
    [
      'a success_url that is none',
      'checkout/sessions',
      { ...session, success_url: 'nowhere' },
      400,
      'url_invalid',
      'success_url',
    ],
    [
      'an unknown parameter',
      'checkout/sessions',
      { ...session, colour: 'blue' },
      400,
      'parameter_unknown',
      'colour',
    ],
    [
      'an unknown nested parameter',
      'checkout/sessions',
      { ...session, line_items: [{ ...item, weight: 1 }] },
      400,
      'parameter_unknown',
      'line_items[0][weight]',
    ],
    [
      'the payment_method_types of older versions',
      'checkout/sessions',
      { ...session, payment_method_types: ['card'] },
      400,
      'parameter_unknown',
      'payment_method_types',
    ],
    [
      'a session that lives 10 minutes',
      'checkout/sessions',
      { ...session, expires_at: soon(600) },
      400,
      undefined,
      'expires_at',
    ],
    [
      'a session that lives 25 hours',
      'checkout/sessions',
      { ...session, expires_at: soon(90_000) },
      400,
      undefined,
      'expires_at',
    ],
    [
      'a broken amount',
      'refunds',
      { charge: 'ch_x', amount: '1.5' },
      400,
      'parameter_invalid_integer',
      'amount',
    ],
    [
      'an amount of zero',
      'refunds',
      { charge: 'ch_x', amount: 0 },
      400,
      'parameter_invalid_integer',
      'amount',
    ],
    ['a refund of nothing', 'refunds', {}, 400, undefined, undefined],
    ['a refund of an unknown charge', 'refunds', { charge: 'ch_x' }, 400, 'resource_missing', 'charge'],
    [
      'a transfer to nobody',
      'transfers',
      { amount: 100, currency: 'usd', destination: 'acct_x' },
      400,
      'resource_missing',
      'destination',
    ],
    [
      'a link for nobody',
      'account_links',
      {
        account: 'acct_x',
        type: 'account_onboarding',
        refresh_url: 'http://127.0.0.1:9/',
        return_url: 'http://127.0.0.1:9/',
      },
      400,
      'resource_missing',
      'account',
    ],
    [
      'a foreign currency',
      'transfers',
      { amount: 100, currency: 'eur', destination: 'acct_x' },
      400,
      undefined,
      'currency',
    ],
  ];
  it.each(cases)('refuses %s', async (_name, path, params, status, code, param) => {
    const error = await failureOf(kit.stripe.rawRequest('POST', `/v1/${path}`, params as never));
    expect({ status: error.statusCode, code: error.code, param: error.param }).toEqual({
      status,
      code,
      param,
    });
    expect(error.type).toBe('StripeInvalidRequestError');
    expect(error.requestId).toMatch(/^req_/);
  });

  it.each([
    'checkout/sessions/cs_test_x',
    'payment_intents/pi_x',
    'charges/ch_x',
    'refunds/re_x',
    'transfers/tr_x',
    'accounts/acct_x',
    'payouts/po_x',
    'balance_transactions/txn_x',
    'events/evt_x',
    'webhook_endpoints/we_x',
  ])('answers 404 for the unknown %s', async (path) => {
    const error = await failureOf(kit.stripe.rawRequest('GET', `/v1/${path}`));
    expect([error.statusCode, error.code]).toEqual([404, 'resource_missing']);
  });

  it('never finds inherited names as objects', async () => {
    const error = await failureOf(kit.stripe.charges.retrieve('constructor'));
    expect(error.statusCode).toBe(404);
  });

  it('answers 401 without a test key and 403 for a foreign account', async () => {
    const bare = await fetch(`${kit.url}/v1/balance`);
    const live = await fetch(`${kit.url}/v1/balance`, { headers: { authorization: 'Bearer sk_live_1' } });
    const foreign = await failureOf(kit.stripe.balance.retrieve({}, { stripeAccount: 'acct_x' }));
    expect([bare.status, live.status]).toEqual([401, 401]);
    expect([foreign.statusCode, foreign.type]).toEqual([403, 'StripePermissionError']);
  });
});
