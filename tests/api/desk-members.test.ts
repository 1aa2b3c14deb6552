import { beforeAll, describe, expect, it } from 'vitest';
import { deskMembersAnswer, type DeskMemberAnswer } from '#shared/schemas/desk.ts';
import type { RegisterAnswer } from '#shared/schemas/lots.ts';
import { pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { openLot } from '#server/features/lots/open-lot.ts';
import { lapseDeal } from '#server/features/payments/lapse-deal.ts';
import { setRole } from '#server/features/members/set-role.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { Member } from '#server/models/member.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { SessionRow } from '#server/models/session-row.ts';
import { buildDeal, inDeal } from '#tests/factories/build-deal.ts';
import { buildLot } from '#tests/factories/build-lot.ts';
import { buildDeskCase } from '#tests/factories/build-desk-case.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const reason = 'Two buyers received another metal than was stated.';
let desk: Visitor;
let admin: Visitor;
let deskMember: BuiltMember;
let adminMember: BuiltMember;

beforeAll(async () => {
  deskMember = await buildMember({ role: 'desk', canSell: true });
  adminMember = await buildMember({ role: 'admin' });
  desk = await app.signIn(deskMember);
  admin = await app.signIn(adminMember);
});

const suspend = (id: string, who = desk) => who.post(`/api/v1/desk/members/${id}/suspend`, { reason });
const reinstate = (id: string, who = desk) => who.post(`/api/v1/desk/members/${id}/reinstate`);

async function search(text: string, who = desk): Promise<DeskMemberAnswer[]> {
  const answer = await who.get(`/api/v1/desk/members?query=${encodeURIComponent(text)}`).expect(200);
  return deskMembersAnswer.parse(answer.body).members;
}

describe('suspending a member', () => {
  it('ends every session at once; the account can look but not act', async () => {
    const member = await buildMember({ canSell: true });
    const [phone, laptop] = [await app.signIn(member), await app.signIn(member)];
    const answer = await suspend(member.id).expect(200);
    expect(answer.body).toMatchObject({ suspensionReason: reason, can: { suspend: false, reinstate: true } });
    expect(await SessionRow.count({ where: { memberId: member.id } })).toBe(0);
    for (const visitor of [phone, laptop]) await visitor.get('/api/v1/me/lots').expect(401);
    const back = await app.signIn(member);
    await back.get('/api/v1/me/lots').expect(200);
    const refused = await back.post('/api/v1/lots').expect(403);
    expect(refused.body.code).toBe('member-suspended');
    const [entry] = await AuditEntry.findAll({ where: { subjectId: member.id } });
    expect(entry).toMatchObject({ act: 'suspend-member', actorId: deskMember.id, actorRole: 'desk' });
    expect(entry!.detail).toEqual({ reason, sessionsEnded: 2, lotsPaused: [] });
  });

  it('takes open lots off the register and out of reach; only their seller puts them back', async () => {
    const seller = await buildMember({ canSell: true });
    const lot = await buildLot({ state: 'open', sellerId: seller.id });
    const paused = await buildLot({ state: 'paused', sellerId: seller.id });
    const other = await buildLot({ state: 'open' });
    const buyer = await app.signIn(await buildMember());
    const listed = async () => {
      const { body } = await buyer.get('/api/v1/lots?sort=newest&limit=50').expect(200);
      return (body as RegisterAnswer).rows.map(({ code }) => code);
    };
    const stateOf = async (code: string) =>
      (await Lot.findOne({ where: { code }, rejectOnEmpty: true })).state;
    expect((await buyer.get(`/api/v1/lots/${lot.code}`).expect(200)).body.can.buy).toBe(true);
    await suspend(seller.id).expect(200);
    expect(await listed()).toContain(other.code);
    expect(await listed()).not.toContain(lot.code);
    await buyer.get(`/api/v1/lots/${lot.code}`).expect(404);
    expect(await stateOf(paused.code)).toBe('paused');
    const [entry] = await AuditEntry.findAll({ where: { subjectId: seller.id } });
    expect(entry!.detail).toMatchObject({ lotsPaused: [lot.code] });
    const seen = await desk.get(`/api/v1/lots/${lot.code}`).expect(200);
    expect(seen.body).toMatchObject({ state: 'paused' });
    expect(seen.body.history.at(-1)).toMatchObject({ act: 'paused', note: 'The account is suspended.' });
    const visitor = await app.signIn(seller);
    expect((await visitor.post(`/api/v1/lots/${lot.code}/reopen`).expect(403)).body.code).toBe(
      'member-suspended',
    );
    await reinstate(seller.id).expect(200);
    expect(await stateOf(lot.code)).toBe('paused');
    await visitor.post(`/api/v1/lots/${lot.code}/reopen`).expect(200);
    expect(await listed()).toContain(lot.code);
    const history = (await buyer.get(`/api/v1/lots/${lot.code}`).expect(200)).body.history as {
      note: unknown;
    }[];
    expect(history.filter(({ note }) => note !== null)).toEqual([]);
  });

  it('leaves a lot that an unpaid purchase gives back paused', async () => {
    const deal = await buildDeal();
    await suspend(deal.seller.id).expect(200);
    const { fundBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    pinDatabaseTime(new Date(fundBy.getTime() + 1_000));
    try {
      await inDeal(deal, (unit) => lapseDeal({ dealId: deal.id }, unit));
    } finally {
      pinDatabaseTime(null);
    }
    expect((await Lot.findByPk(deal.lot.id, { rejectOnEmpty: true })).state).toBe('paused');
  });

  it('keeps the desk from opening a lot of a suspended seller', async () => {
    const lot = await buildLot({ state: 'submitted' });
    await suspend(lot.sellerId).expect(200);
    const opened = withTransaction({ lots: [lot.id] }, async (unit) => {
      const row = await Lot.findByPk(lot.id, { transaction: unit.tx, rejectOnEmpty: true });
      return openLot({ lot: row, grade: 'certified' }, unit, deskMember);
    });
    await expect(opened).rejects.toMatchObject({ code: 'illegal-transition' });
  });

  it('is lifted again; a second time of either is refused', async () => {
    const member = await buildMember();
    const early = await reinstate(member.id).expect(409);
    expect(early.body.code).toBe('illegal-transition');
    await suspend(member.id).expect(200);
    const twice = await suspend(member.id).expect(409);
    expect(twice.body.code).toBe('illegal-transition');
    const answer = await reinstate(member.id).expect(200);
    expect(answer.body).toMatchObject({ suspendedAt: null, suspensionReason: null });
    const entries = await AuditEntry.findAll({ where: { subjectId: member.id }, order: [['at', 'ASC']] });
    expect(entries.map((entry) => entry.act)).toEqual(['suspend-member', 'reinstate-member']);
  });

  it('spares admins and oneself; of the desk only an admin decides', async () => {
    const other = await buildMember({ role: 'desk' });
    const lab = await buildMember({ role: 'lab' });
    for (const [id, who] of [
      [adminMember.id, desk],
      [deskMember.id, desk],
      [other.id, desk],
      [adminMember.id, admin],
    ] as const) {
      const answer = await suspend(id, who).expect(403);
      expect(answer.body.code).toBe('forbidden');
      expect((await Member.findByPk(id))!.suspendedAt).toBeNull();
    }
    await suspend(other.id, admin).expect(200);
    await suspend(lab.id).expect(200);
    await suspend('00000000-0000-7000-8000-00000000dead').expect(404);
    const short = await desk.post(`/api/v1/desk/members/${lab.id}/suspend`, { reason: 'no' }).expect(422);
    expect(short.body.errors[0].pointer).toBe('/reason');
  });

  it('is not for members or laboratories', async () => {
    const subject = await buildMember();
    for (const role of ['member', 'lab'] as const) {
      const visitor = await app.signIn(await buildMember({ role }));
      await suspend(subject.id, visitor).expect(403);
      await reinstate(subject.id, visitor).expect(403);
      await visitor.get('/api/v1/desk/members?query=mem').expect(403);
    }
  });
});

describe('finding a member', () => {
  it('works by a part of the name and by the whole e-mail, without showing the e-mail', async () => {
    const member = await buildMember();
    const mark = member.displayName.slice('Member '.length);
    for (const text of [mark.slice(1), member.email.toUpperCase()]) {
      const found = await search(text);
      expect(found.map((row) => row.id)).toContain(member.id);
      expect(JSON.stringify(found)).not.toContain('@');
    }
    expect(await search(member.email.slice(0, -1))).toEqual([]);
  });

  it('takes signs of the pattern language as they are', async () => {
    await buildMember();
    expect(await search('%')).toEqual([]);
    expect(await search('Member_')).toEqual([]);
  });

  it('lists who is suspended when nothing is asked', async () => {
    const [free, member] = [await buildMember(), await buildMember()];
    await suspend(member.id).expect(200);
    const ids = (await search('')).map((row) => row.id);
    expect(ids).toContain(member.id);
    expect(ids).not.toContain(free.id);
  });
});

describe('pulling a lot', () => {
  const pull = (code: string, who = desk) => who.post(`/api/v1/desk/lots/${code}/pull`, { reason });

  it('withdraws it with a reason, takes it out of the queue and tells the seller', async () => {
    const made = await buildDeskCase();
    await desk.post(`/api/v1/desk/certificates/${made.id}/claim`).expect(200);
    const { body } = await pull(made.code).expect(200);
    expect(body).toEqual({ code: made.code, state: 'withdrawn' });
    const lot = await Lot.findByPk(made.lotId, { rejectOnEmpty: true });
    expect(lot).toMatchObject({ state: 'withdrawn', pulledByDesk: true, stateReason: reason });
    expect(lot.endedAt).toBeInstanceOf(Date);
    const certificate = await Certificate.findByPk(made.id, { rejectOnEmpty: true });
    expect(certificate).toMatchObject({ state: 'superseded', liveKey: null, claimedById: null });
    const mails = await OutboxMail.findAll({ where: { memberId: made.sellerId } });
    expect(mails.map((mail) => mail.mail)).toEqual(['lot-pulled']);
    const [entry] = await AuditEntry.findAll({ where: { subjectId: made.code } });
    expect(entry).toMatchObject({ act: 'pull-lot', subjectKind: 'lot', detail: { reason } });
    const twice = await pull(made.code).expect(409);
    expect(twice.body.code).toBe('illegal-transition');
  });

  it.each(['agreed', 'funded'] as const)('refuses while a deal that is %s runs over it', async (state) => {
    const deal = await buildDeal({ state });
    const refused = await pull(deal.lot.code).expect(409);
    expect(refused.body.code).toBe('illegal-transition');
    expect((await Lot.findByPk(deal.lot.id))!.pulledByDesk).toBe(false);
  });

  it('refuses a reserved lot, an own lot, a draft, and anyone else', async () => {
    const running = await buildDeskCase();
    await Lot.update({ state: 'reserved' }, { where: { id: running.lotId } });
    const refused = await pull(running.code).expect(409);
    expect(refused.body.code).toBe('illegal-transition');
    const own = await buildDeskCase({ seller: deskMember });
    expect((await pull(own.code).expect(403)).body.code).toBe('own-case');
    await Lot.update({ state: 'draft' }, { where: { id: running.lotId } });
    await pull(running.code).expect(404);
    await pull('S-ZZZZZZ').expect(404);
    for (const role of ['member', 'lab'] as const)
      await pull(own.code, await app.signIn(await buildMember({ role }))).expect(403);
    expect((await Lot.findByPk(own.lotId))!.state).toBe('submitted');
  });
});

describe('giving a role', () => {
  const give = (memberId: string, role: 'member' | 'desk' | 'admin') =>
    withTransaction({ members: [memberId] }, (unit) => setRole({ memberId, role }, unit, null));

  it('holds from the next request on and stands in the trail', async () => {
    const member = await buildMember();
    const visitor = await app.signIn(member);
    await visitor.get('/api/v1/desk/certificates').expect(403);
    await give(member.id, 'desk');
    await visitor.get('/api/v1/desk/certificates').expect(200);
    await give(member.id, 'desk');
    const entries = await AuditEntry.findAll({ where: { subjectId: member.id } });
    expect(entries.map((entry) => [entry.act, entry.actorRole, entry.detail])).toEqual([
      ['set-role', 'house', { from: 'member', to: 'desk' }],
    ]);
  });

  it('never takes the last admin away', async () => {
    const admins = await Member.findAll({ where: { role: 'admin' } });
    for (const { id } of admins) if (id !== adminMember.id) await give(id, 'member');
    await expect(give(adminMember.id, 'member')).rejects.toMatchObject({ code: 'illegal-transition' });
    const second = await buildMember();
    await give(second.id, 'admin');
    await give(adminMember.id, 'member');
    await give(adminMember.id, 'admin');
  });
});
