import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { deadMailsAnswer } from '#shared/schemas/admin.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Member } from '#server/models/member.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const MAILS = '/api/v1/admin/mails';
let admin: Visitor;
let adminMember: BuiltMember;

beforeAll(async () => {
  adminMember = await buildMember({ role: 'admin' });
  admin = await app.signIn(adminMember);
});
beforeEach(() => OutboxMail.destroy({ where: {} }));

async function mailOf(member: BuiltMember, changes: Partial<OutboxMail> = {}): Promise<OutboxMail> {
  const uniqueKey = `welcome:${newId()}`;
  await withTransaction({}, (unit) =>
    enqueueMail({ mail: 'welcome', memberId: member.id, uniqueKey, input: { displayName: 'Bram' } }, unit),
  );
  const mail = await OutboxMail.findOne({ where: { uniqueKey }, rejectOnEmpty: true });
  return mail.update(changes);
}
const dead = (member: BuiltMember) =>
  mailOf(member, { state: 'dead', tries: 12, lastError: '550 no such mailbox' });
const sendAgain = (id: string, who = admin) => who.post(`${MAILS}/${id}/send-again`);

describe('mails that were given up', () => {
  it('are listed with whom they are for, the tries and what was said; others are not', async () => {
    const member = await buildMember();
    const mail = await dead(member);
    await mailOf(member);
    await mailOf(member, { state: 'sent' });
    const { body } = await admin.get(MAILS).expect(200);
    expect(deadMailsAnswer.parse(body)).toEqual({
      rows: [
        {
          id: mail.id,
          mail: 'welcome',
          member: { id: member.id, displayName: member.displayName },
          recipient: member.email,
          tries: 12,
          lastError: '550 no such mailbox',
          orderedAt: mail.createdAt.toISOString(),
          deadSince: mail.updatedAt.toISOString(),
        },
      ],
      total: 1,
    });
    expect(JSON.stringify(body)).not.toContain('Bram');
  });

  it('are due anew with all their tries, at the address the account has now, and the trail says so', async () => {
    const member = await buildMember();
    const mail = await dead(member);
    const email = `new-${member.email}`;
    await Member.update({ email }, { where: { id: member.id } });
    const { body } = await sendAgain(mail.id).expect(200);
    expect(body).toEqual({ rows: [], total: 0 });
    expect(await mail.reload()).toMatchObject({ state: 'due', tries: 0, recipient: email });
    const [entry] = await AuditEntry.findAll({ where: { subjectId: mail.id } });
    expect(entry).toMatchObject({ act: 'send-mail-again', subjectKind: 'mail', actorId: adminMember.id });
    expect(entry!.detail).toMatchObject({ mail: 'welcome', tries: 12, lastError: '550 no such mailbox' });
    const trail = await admin.get('/api/v1/admin/audit?limit=1').expect(200);
    expect(trail.body.rows[0].subject).toBe('mail welcome');
  });

  it('are sent again once by two admins at once', async () => {
    const mail = await dead(await buildMember());
    const answers = await Promise.all([sendAgain(mail.id), sendAgain(mail.id)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(await AuditEntry.count({ where: { subjectId: mail.id } })).toBe(1);
  });

  it('refuses one that was not given up, and one that is not there', async () => {
    const mail = await mailOf(await buildMember());
    expect((await sendAgain(mail.id).expect(409)).body.code).toBe('illegal-transition');
    await sendAgain('00000000-0000-7000-8000-00000000dead').expect(404);
    await sendAgain('no-id').expect(404);
  });

  it('are for admins alone', async () => {
    const mail = await dead(await buildMember());
    for (const role of ['member', 'desk', 'lab'] as const) {
      const visitor = await app.signIn(await buildMember({ role }));
      await visitor.get(MAILS).expect(403);
      await sendAgain(mail.id, visitor).expect(403);
    }
    await (await app.visitor()).get(MAILS).expect(401);
    expect((await mail.reload()).state).toBe('dead');
  });
});
