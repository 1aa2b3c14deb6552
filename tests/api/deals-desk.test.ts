import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { dealAnswer } from '#shared/schemas/deals.ts';
import { deskDealsAnswer } from '#shared/schemas/desk.ts';
import { dealLedger, heldMinor } from '#server/features/ledger/ledger-queries.ts';
import {
  AuditEntry,
  Deal,
  DealSheet,
  Lot,
  Member,
  OutboxMail,
  Payout,
  Refund,
} from '#server/models/index.ts';
import { buildDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const key = () => ({ 'Idempotency-Key': randomUUID() });
const reason = 'The scale photographs show that the mass is as stated.';
const rule = (visitor: Visitor, { code }: BuiltDeal, ruling: string, headers = key()) =>
  visitor.post(`/api/v1/desk/deals/${code}/ruling`, { ruling, reason }, headers);
const staff = async (role: 'desk' | 'admin' = 'desk'): Promise<[BuiltMember, Visitor]> => {
  const member = await buildMember({ role });
  return [member, await app.signIn(member)];
};

async function promote(member: BuiltMember): Promise<Visitor> {
  await Member.update({ role: 'desk' }, { where: { id: member.id } });
  return app.signIn(member);
}

describe('a ruling', () => {
  it('for release settles the deal, with its reason for both sides', async () => {
    const deal = await buildDeal({ state: 'contested' });
    const [member, desk] = await staff();
    const { body } = await rule(desk, deal, 'release').expect(200);
    const answer = dealAnswer.parse(body);
    expect(answer).toMatchObject({ state: 'settled', side: 'desk', held: { amount: '0.00' } });
    expect(answer.events.at(-1)).toMatchObject({ act: 'ruled-release', who: 'desk' });
    expect(answer.events.at(-1)?.text).toContain(reason);
    expect(await DealSheet.count({ where: { dealId: deal.id, moment: 'final' } })).toBe(1);
    expect((await Payout.findOne({ where: { dealId: deal.id } }))?.amountMinor).toBe(184_900n);
    expect((await Lot.findByPk(deal.lot.id))?.state).toBe('sold');
    const audit = await AuditEntry.findOne({ where: { subjectId: deal.code, act: 'rule-deal' } });
    expect(audit).toMatchObject({ actorId: member.id, detail: { ruling: 'release', reason } });
  });

  it('for a refund cancels the deal, closes the lot and keeps the money held until it is sent back', async () => {
    const deal = await buildDeal({ state: 'contested' });
    const [, admin] = await staff('admin');
    const { body } = await rule(admin, deal, 'refund').expect(200);
    expect(dealAnswer.parse(body)).toMatchObject({
      state: 'cancelled',
      held: { amount: '1925.00' },
      refund: { state: 'due', amount: { amount: '1925.00' } },
      endReason: reason,
      due: { who: 'provider', act: 'Refund the buyer' },
    });
    expect((await Lot.findByPk(deal.lot.id))?.state).toBe('closed');
    expect(await Payout.count({ where: { dealId: deal.id } })).toBe(0);
    const mails = await OutboxMail.findAll({ where: { memberId: [deal.buyer.id, deal.seller.id] } });
    expect(mails.filter(({ mail }) => mail === 'deal-ruled')).toHaveLength(2);
    expect(mails.filter(({ mail }) => mail === 'deal-cancelled')).toHaveLength(2);
  });

  it('both ways at once is one ruling', async () => {
    const deal = await buildDeal({ state: 'contested' });
    const [, one] = await staff();
    const [, two] = await staff();
    const answers = await Promise.all([rule(one, deal, 'release'), rule(two, deal, 'refund')]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const { state } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    const settlements = (await dealLedger(deal.id)).filter(({ kind }) => kind === 'settlement');
    expect(settlements.length > 0).toBe(state === 'settled');
    expect(await Refund.count({ where: { dealId: deal.id } })).toBe(state === 'settled' ? 0 : 1);
    expect(await heldMinor(deal.id)).toBe(state === 'settled' ? 0n : 192_500n);
  });

  it('under the same key is one ruling with one answer, and no other one', async () => {
    const deal = await buildDeal({ state: 'contested' });
    const [, desk] = await staff();
    const headers = key();
    const first = await rule(desk, deal, 'release', headers).expect(200);
    expect((await rule(desk, deal, 'release', headers).expect(200)).body).toEqual(first.body);
    expect((await rule(desk, deal, 'refund', headers).expect(422)).body.code).toBe('idempotency-key-reused');
  });

  it('is never given on an own deal, as buyer or as seller', async () => {
    const deal = await buildDeal({ state: 'contested' });
    for (const side of [deal.buyer, deal.seller]) {
      const own = await promote(side);
      expect((await rule(own, deal, 'release').expect(403)).body.code).toBe('own-case');
      const freeze = await own
        .post(`/api/v1/desk/deals/${deal.code}/freeze`, { reason: 'Look at it.' })
        .expect(403);
      expect(freeze.body.code).toBe('own-case');
    }
    expect((await Deal.findByPk(deal.id))?.state).toBe('contested');
  });

  it('is the desk’s, with a reason, on a contested deal that is not frozen', async () => {
    const deal = await buildDeal({ state: 'contested' });
    const [, desk] = await staff();
    await rule(await app.signIn(deal.buyer), deal, 'refund').expect(403);
    await rule(await app.signIn(await buildMember({ role: 'lab' })), deal, 'refund').expect(403);
    const path = `/api/v1/desk/deals/${deal.code}/ruling`;
    const bare = await desk.post(path, { ruling: 'refund', reason: 'no' }, key()).expect(422);
    expect(bare.body.errors).toMatchObject([{ pointer: '/reason' }]);
    expect(
      (await desk.post(path, { ruling: 'half', reason }, key()).expect(422)).body.errors[0].pointer,
    ).toBe('/ruling');
    const running = await buildDeal({ state: 'delivered' });
    expect((await rule(desk, running, 'refund').expect(409)).body.code).toBe('illegal-transition');
    await rule(desk, { ...deal, code: 'D-ZZZZZZ' }, 'refund').expect(404);
    await Deal.update({ frozenAt: new Date() }, { where: { id: deal.id } });
    expect((await rule(desk, deal, 'refund').expect(409)).body.code).toBe('deal-frozen');
  });
});

describe('a freeze', () => {
  const freeze = (visitor: Visitor, { code }: BuiltDeal) =>
    visitor.post(`/api/v1/desk/deals/${code}/freeze`, { reason: 'An official request.' });

  it('shows on the deal, stops its clock and every act', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    const [, desk] = await staff();
    const { body } = await freeze(desk, deal).expect(200);
    expect(body).toMatchObject({ isFrozen: true, can: { freeze: false, unfreeze: true } });
    const seen = (await (await app.signIn(deal.buyer)).get(`/api/v1/deals/${deal.code}`)).body;
    expect(seen).toMatchObject({ isFrozen: true, due: { at: null }, can: { accept: false, contest: false } });
  });

  it('is refused twice, where nothing is held, and lifting where there is none', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const [, desk] = await staff();
    const lift = `/api/v1/desk/deals/${deal.code}/unfreeze`;
    expect((await desk.post(lift).expect(409)).body.code).toBe('illegal-transition');
    await freeze(desk, deal).expect(200);
    expect((await freeze(desk, deal).expect(409)).body.code).toBe('deal-frozen');
    expect((await freeze(desk, await buildDeal()).expect(409)).body.code).toBe('illegal-transition');
    await freeze(await app.signIn(deal.seller), deal).expect(403);
  });
});

describe('the list of contested deals', () => {
  it('is the desk’s, the oldest first, and marks the own ones', async () => {
    const first = await buildDeal({ state: 'contested' });
    const second = await buildDeal({ state: 'contested' });
    const own = await promote(second.seller);
    const { contested } = deskDealsAnswer.parse((await own.get('/api/v1/desk/deals').expect(200)).body);
    const codes = contested.map(({ code }) => code);
    expect(codes.indexOf(first.code)).toBeLessThan(codes.indexOf(second.code));
    expect(contested.find(({ code }) => code === second.code)?.isOwn).toBe(true);
    expect(contested.find(({ code }) => code === first.code)).toMatchObject({
      isOwn: false,
      reason: 'Wrong mass',
      total: '1925.00',
    });
    await (await app.signIn(first.buyer)).get('/api/v1/desk/deals').expect(403);
  });
});
