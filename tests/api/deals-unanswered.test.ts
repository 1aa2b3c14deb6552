import { afterEach, describe, expect, it } from 'vitest';
import { dealAnswer, dealsAnswer } from '#shared/schemas/deals.ts';
import { deskDealsAnswer } from '#shared/schemas/desk.ts';
import { databaseNow, pinDatabaseTime } from '#server/database/transaction.ts';
import { heldMinor } from '#server/features/ledger/ledger-queries.ts';
import { AuditEntry, Deal, Member, OutboxMail } from '#server/models/index.ts';
import { buildDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const reason = 'Asked twice by mail and once by telephone, without an answer.';
const takeUp = (visitor: Visitor, { code }: BuiltDeal, body: object = { reason }) =>
  visitor.post(`/api/v1/desk/deals/${code}/take-up`, body);
const read = async (visitor: Visitor, { code }: BuiltDeal) =>
  dealAnswer.parse((await visitor.get(`/api/v1/deals/${code}`).expect(200)).body);
const desk = async () => app.signIn(await buildMember({ role: 'desk' }));

afterEach(() => pinDatabaseTime(null));

/** A delivered deal, and the clock just past or just before the end of its buyer's days. */
async function unanswered(offsetMs = 1): Promise<BuiltDeal> {
  const deal = await buildDeal({ state: 'delivered' });
  const { inspectBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
  pinDatabaseTime(new Date(inspectBy!.getTime() + offsetMs));
  return deal;
}

describe('a delivery that gets no answer', () => {
  it('is listed for the desk and taken up; then it waits for a ruling, the money held', async () => {
    const deal = await unanswered();
    const visitor = await desk();
    const { overdue } = deskDealsAnswer.parse((await visitor.get('/api/v1/desk/deals').expect(200)).body);
    expect(overdue.find(({ code }) => code === deal.code)).toMatchObject({ total: '1925.00', isOwn: false });
    const before = await read(visitor, deal);
    expect(before.can).toMatchObject({ takeUp: true, rule: false });
    expect(before.due?.silence).toContain('the desk takes up the deal');
    const answer = dealAnswer.parse((await takeUp(visitor, deal).expect(200)).body);
    expect(answer).toMatchObject({
      state: 'contested',
      contest: { reason: 'not_answered', note: reason },
      held: { amount: '1925.00' },
      can: { takeUp: false, rule: true },
      due: { who: 'desk' },
    });
    expect(answer.events.at(-1)).toMatchObject({ act: 'taken-up', who: 'desk' });
    expect(answer.events.at(-1)?.text).toBe(`Taken up by the desk: the time to inspect is over. ${reason}`);
    expect(await heldMinor(deal.id)).toBe(192_500n);
    const sides = [deal.buyer.id, deal.seller.id];
    expect(await OutboxMail.count({ where: { mail: 'deal-taken-up', memberId: sides } })).toBe(2);
    const audit = await AuditEntry.findOne({ where: { subjectId: deal.code, act: 'take-up-deal' } });
    expect(audit).toMatchObject({ detail: { reason } });
    const list = deskDealsAnswer.parse((await visitor.get('/api/v1/desk/deals').expect(200)).body);
    expect(list.overdue.some(({ code }) => code === deal.code)).toBe(false);
    expect(list.contested.find(({ code }) => code === deal.code)?.reason).toBe('Not answered in time');
    await (
      await app.signIn(deal.buyer)
    )
      .post(`/api/v1/deals/${deal.code}/contest`, {
        reason: 'damaged',
        note: 'It is broken in two.',
      })
      .expect(409);
  });

  it('is the buyer’s alone until his time has passed, to the millisecond', async () => {
    const deal = await unanswered(-1);
    const visitor = await desk();
    expect((await takeUp(visitor, deal).expect(409)).body.code).toBe('illegal-transition');
    const { overdue } = deskDealsAnswer.parse((await visitor.get('/api/v1/desk/deals').expect(200)).body);
    expect(overdue.some(({ code }) => code === deal.code)).toBe(false);
    expect((await read(visitor, deal)).due?.silence).toContain('from then on the desk can take up');
    pinDatabaseTime(new Date((await databaseNow()).getTime() + 1));
    await takeUp(visitor, deal).expect(200);
  });

  it('is not taken up without a reason, by others, on an own deal, frozen, or twice', async () => {
    const deal = await unanswered();
    const visitor = await desk();
    const bare = await takeUp(visitor, deal, { reason: 'late' }).expect(422);
    expect(bare.body.errors).toMatchObject([{ pointer: '/reason' }]);
    await takeUp(await app.signIn(deal.seller), deal).expect(403);
    await Member.update({ role: 'desk' }, { where: { id: deal.seller.id } });
    expect((await takeUp(await app.signIn(deal.seller), deal).expect(403)).body.code).toBe('own-case');
    await Deal.update({ frozenAt: await databaseNow() }, { where: { id: deal.id } });
    expect((await takeUp(visitor, deal).expect(409)).body.code).toBe('deal-frozen');
    await Deal.update({ frozenAt: null }, { where: { id: deal.id } });
    const answers = await Promise.all([takeUp(visitor, deal), takeUp(await desk(), deal)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });
});

describe('what the desk reads of a deal', () => {
  it('names both sides, and no sheet speaks to it as “you”', async () => {
    const deal = await buildDeal({ state: 'settled' });
    const seen = await read(await desk(), deal);
    expect(seen.buyer.displayName).not.toBe(seen.seller.displayName);
    for (const sheet of [seen.provisionalSheet, seen.finalSheet!]) {
      expect(sheet.lines.at(-1)).toMatchObject({ label: 'Goes to the seller', amount: '1849.00' });
    }
    const own = await read(await app.signIn(deal.seller), deal);
    expect(own.finalSheet?.lines.at(-1)?.label).toBe('Goes to you');
  });
});

describe('a closed deal of mine', () => {
  it('is over since it was paid out or ended, whatever is written to it later', async () => {
    const me = await buildMember({ canSell: true });
    const paid = await buildDeal({ seller: me, state: 'settled' });
    const lapsed = await buildDeal({ buyer: me });
    const day = new Date('2026-11-20T08:00:00.000Z');
    const end = new Date('2026-11-21T08:00:00.000Z');
    await Deal.update({ state: 'paid_out', paidOutAt: day }, { where: { id: paid.id } });
    await Deal.update({ state: 'lapsed', endedAt: end, liveLotId: null }, { where: { id: lapsed.id } });
    const running = await buildDeal({ buyer: me });
    const { closed, toDo } = dealsAnswer.parse(
      (await (await app.signIn(me)).get('/api/v1/deals').expect(200)).body,
    );
    expect(Object.fromEntries(closed.map(({ code, closedAt }) => [code, closedAt]))).toEqual({
      [paid.code]: day.toISOString(),
      [lapsed.code]: end.toISOString(),
    });
    expect(toDo.map(({ code, closedAt }) => [code, closedAt])).toEqual([[running.code, null]]);
  });
});
