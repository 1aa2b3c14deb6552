import { afterEach, describe, expect, it } from 'vitest';
import { PayoutAccount } from '#server/models/payout-account.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { eventually, startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);
const path = '/api/v1/me/payout-account';

afterEach(async () => {
  await payments.noFaults();
  await payments.webhooks('normal');
});

async function newcomer() {
  const member = await buildMember();
  return { member, visitor: await app.signIn(member) };
}

const accountOf = (memberId: string) => PayoutAccount.findOne({ where: { memberId }, rejectOnEmpty: true });

async function accountsAtProvider(memberId: string) {
  const accounts = await payments.objects('account');
  return accounts.filter(
    ({ value }) => (value['metadata'] as Record<string, string>)['member_id'] === memberId,
  );
}

describe('payout onboarding', () => {
  it("goes on to the provider's page, and selling opens when the provider says so", async () => {
    const { member, visitor } = await newcomer();
    const { body } = await visitor.post(path).expect(200);
    expect(body.url).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/connect\//);
    const before = await visitor.refreshToken();
    expect(before.member?.payouts.state).toBe('started');
    expect(before.member?.can.sell).toBe(false);
    const { providerAccountId } = await accountOf(member.id);
    await payments.control('onboard', { accountId: providerAccountId });
    await eventually(async () => expect((await visitor.refreshToken()).member?.can.sell).toBe(true));
    const after = await visitor.refreshToken();
    expect(after.member?.payouts).toEqual({ state: 'ready', requirements: [] });
  });

  it('makes one account for ten clicks, each with a link of its own', async () => {
    const { member, visitor } = await newcomer();
    const answers = await Promise.all(Array.from({ length: 10 }, () => visitor.post(path)));
    const urls = answers.filter(({ status }) => status === 200).map(({ body }) => body.url);
    expect(urls.length).toBeGreaterThan(0);
    expect(new Set(urls).size).toBe(urls.length);
    expect(await accountsAtProvider(member.id)).toHaveLength(1);
    expect(await PayoutAccount.count({ where: { memberId: member.id } })).toBe(1);
    await visitor.post(path).expect(200);
    expect(await accountsAtProvider(member.id)).toHaveLength(1);
  });

  it('is read again on the return, when no message comes', async () => {
    const { member, visitor } = await newcomer();
    expect((await visitor.post(`${path}/refresh`).expect(200)).body).toEqual({
      state: 'none',
      requirements: [],
    });
    await visitor.post(path).expect(200);
    const open = await visitor.post(`${path}/refresh`).expect(200);
    expect(open.body.state).toBe('started');
    expect(open.body.requirements).toContain('external_account');
    await payments.webhooks('drop');
    await payments.control('onboard', { accountId: (await accountOf(member.id)).providerAccountId });
    expect((await visitor.refreshToken()).member?.can.sell).toBe(false);
    expect((await visitor.post(`${path}/refresh`).expect(200)).body.state).toBe('ready');
    expect((await visitor.refreshToken()).member?.can.sell).toBe(true);
  });

  it('asks to come again while the provider does not answer, and finds its account again', async () => {
    const { member, visitor } = await newcomer();
    await payments.fault({ kind: '500', path: '/v1/accounts', method: 'POST', count: 3 });
    const refused = await visitor.post(path).expect(503);
    expect(refused.body.code).toBe('payment-provider-unavailable');
    expect((await accountOf(member.id)).providerAccountId).toBeNull();
    await payments.fault({ kind: 'reset', path: '/v1/accounts', method: 'POST', count: 1, stage: 'after' });
    await visitor.post(path).expect(200);
    expect(await accountsAtProvider(member.id)).toHaveLength(1);
  });

  it('needs somebody signed in', async () => {
    const visitor = await app.visitor();
    await visitor.post(path).expect(401);
    await visitor.post(`${path}/refresh`).expect(401);
  });
});
