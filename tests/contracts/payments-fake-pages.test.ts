import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startKit } from './payments-fake-kit.ts';
import type { Kit } from './payments-fake-kit.ts';

let kit: Kit;
beforeAll(async () => {
  kit = await startKit();
});
afterAll(() => kit.close());

const get = (url: string) => fetch(url, { redirect: 'manual' });
const submit = (url: string, fields: Record<string, string>) =>
  fetch(url, { method: 'POST', body: new URLSearchParams(fields), redirect: 'manual' });
const goodCard = { number: '4242 4242 4242 4242', expiry: '12/40', cvc: '123', name: '' };

/** Each input of a page has a label, and each described-by id exists. */
function unlabelled(html: string): string[] {
  const ids = [...html.matchAll(/<(?:input|select) [^>]*?id="([\w-]+)"/g)].map((match) => match[1] ?? '');
  const described = [...html.matchAll(/aria-describedby="([^"]+)"/g)].flatMap((match) =>
    (match[1] ?? '').split(' '),
  );
  return [
    ...ids.filter((id) => !html.includes(`<label for="${id}">`)),
    ...described.filter((id) => !html.includes(`id="${id}"`)),
  ];
}

describe('the pay page', () => {
  it('shows what is paid for, says that it is a stand-in, and labels its fields', async () => {
    const session = await kit.openSession(123_456, {
      line_items: [
        {
          quantity: 2,
          price_data: { currency: 'usd', unit_amount: 61_728, product_data: { name: '<b>Bar & grain</b>' } },
        },
      ],
    });
    const html = await (await get(session.url ?? '')).text();
    expect(html).toContain('local stand-in');
    expect(html).toContain('2 × &lt;b&gt;Bar &amp; grain&lt;/b&gt;');
    expect(html).toContain('$1,234.56');
    expect(html).toContain('href="http://127.0.0.1:9/back"');
    expect(html.match(/<input id=/g)).toHaveLength(4);
    expect(unlabelled(html)).toEqual([]);
  });

  it('takes a good card and returns to the shop with the session id', async () => {
    const session = await kit.openSession();
    const paid = await submit(session.url ?? '', goodCard);
    expect([paid.status, paid.headers.get('location')]).toEqual([
      303,
      `http://127.0.0.1:9/done?session=${session.id}`,
    ]);
    const again = await submit(session.url ?? '', goodCard);
    expect(again.headers.get('location')).toBe(paid.headers.get('location'));
    const done = await kit.stripe.checkout.sessions.retrieve(session.id);
    expect(done.payment_status).toBe('paid');
  });

  it.each([
    ['no number', { number: '' }, 'number'],
    ['a number with a wrong digit', { number: '4242424242424241' }, 'number'],
    ['no expiry', { expiry: '' }, 'expiry'],
    ['month 13', { expiry: '13/40' }, 'expiry'],
    ['a past expiry', { expiry: '01/20' }, 'expiry'],
    ['a short security code', { cvc: '12' }, 'cvc'],
  ])('shows %s at its field and charges nothing', async (_name, change, field) => {
    const session = await kit.openSession();
    const answer = await submit(session.url ?? '', { ...goodCard, ...change });
    const html = await answer.text();
    expect(answer.status).toBe(422);
    expect(html).toContain('<title>Error: ');
    expect(html).toContain(`<a href="#${field}">`);
    expect(html).toContain(`id="${field}-error"`);
    expect(unlabelled(html)).toEqual([]);
    expect((await kit.stripe.checkout.sessions.retrieve(session.id)).payment_intent).toBeNull();
  });

  it('shows all faults of an empty form at once', async () => {
    const session = await kit.openSession();
    const html = await (await submit(session.url ?? '', {})).text();
    expect(html.match(/class="error"/g)).toHaveLength(3);
  });

  it('shows a decline and can be tried again', async () => {
    const session = await kit.openSession();
    const declined = await submit(session.url ?? '', { ...goodCard, number: '4000000000009995' });
    expect(declined.status).toBe(402);
    expect(await declined.text()).toContain('insufficient funds');
    expect((await submit(session.url ?? '', goodCard)).status).toBe(303);
  });

  it('is gone when the session has expired or never was', async () => {
    const session = await kit.openSession();
    await kit.stripe.checkout.sessions.expire(session.id);
    const gone = await get(session.url ?? '');
    expect([gone.status, (await gone.text()).includes('Go back')]).toEqual([410, true]);
    expect((await get(`${kit.url}/pay/cs_test_x`)).status).toBe(404);
  });
});

describe('the onboarding page', () => {
  const link = async (account: string) =>
    kit.stripe.accountLinks.create({
      account,
      type: 'account_onboarding',
      refresh_url: 'http://127.0.0.1:9/refresh',
      return_url: 'http://127.0.0.1:9/return',
    });

  it('takes a name and a bank and returns to the marketplace', async () => {
    const account = await kit.newAccount();
    const opened = await get((await link(account.id)).url);
    const form = `${kit.url}${opened.headers.get('location')}`;
    const html = await (await get(form)).text();
    expect(unlabelled(html)).toEqual([]);
    const wrong = await submit(form, { name: '', bank: '1' });
    expect([wrong.status, (await wrong.text()).match(/class="error"/g)?.length]).toEqual([422, 2]);
    const done = await submit(form, { name: 'Ilka Varn', bank: '000123456789' });
    expect([done.status, done.headers.get('location')]).toEqual([303, 'http://127.0.0.1:9/return']);
    const ready = await kit.stripe.accounts.retrieve(account.id);
    expect([ready.payouts_enabled, ready.business_profile?.name]).toEqual([true, 'Ilka Varn']);
    expect((await submit(form, { name: 'Again', bank: '000123456789' })).status).toBe(404);
  });

  it('opens once, then asks for a new link', async () => {
    const { url } = await link((await kit.newAccount()).id);
    expect((await get(url)).headers.get('location')).toMatch(/^\/connect\/visit\//);
    expect((await get(url)).headers.get('location')).toBe('http://127.0.0.1:9/refresh');
  });

  it('asks for a new link when the time is up', async () => {
    const { url, expires_at: until, created } = await link((await kit.newAccount()).id);
    expect(until - created).toBe(300);
    await kit.control('clock', { advanceSeconds: 300 });
    expect((await get(url)).headers.get('location')).toBe('http://127.0.0.1:9/refresh');
  });
});

describe('the page of buttons', () => {
  it('lists what there is and obeys its buttons', async () => {
    const account = await kit.payee();
    const charge = await kit.paidCharge();
    const source = { source_transaction: charge.id, destination: account.id };
    await kit.stripe.transfers.create({ ...source, amount: 700, currency: 'usd' });
    const stripeAccount = account.id;
    const payout = await kit.stripe.payouts.create({ amount: 700, currency: 'usd' }, { stripeAccount });
    const html = await (await get(`${kit.url}/`)).text();
    expect(html).toContain(payout.id);
    expect(unlabelled(html)).toEqual([]);
    const action = `/control/payouts/${payout.id}/fail`;
    expect(html).toContain(`action="${action}"`);
    const pressed = await submit(`${kit.url}${action}`, {});
    expect([pressed.status, pressed.headers.get('location')]).toEqual([303, '/']);
    expect((await kit.stripe.payouts.retrieve(payout.id, {}, { stripeAccount })).status).toBe('failed');
  });

  it('moves the clock', async () => {
    const pressed = await submit(`${kit.url}/control/clock`, { advanceSeconds: '86400' });
    expect(pressed.status).toBe(303);
    expect(await (await get(`${kit.url}/`)).text()).toContain('s ahead of real time');
  });
});
