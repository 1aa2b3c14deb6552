import { beforeAll, describe, expect, it } from 'vitest';
import { auditAnswer, type AuditAnswer } from '#shared/schemas/desk.ts';
import { sequelize } from '#server/database/connection.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
let admin: Visitor;
let deskMember: BuiltMember;

beforeAll(async () => {
  admin = await app.signIn(await buildMember({ role: 'admin' }));
  deskMember = await buildMember({ role: 'desk' });
});

async function page(query: string): Promise<AuditAnswer> {
  return auditAnswer.parse((await admin.get(`/api/v1/admin/audit${query}`).expect(200)).body);
}

describe('the audit trail', () => {
  it('names who did what to whom, newest first', async () => {
    const subject = await buildMember();
    await withTransaction({}, (unit) =>
      recordAudit(
        {
          actor: deskMember.actor,
          act: 'note-one',
          subjectKind: 'member',
          subjectId: subject.id,
          detail: { a: 1 },
        },
        unit,
      ),
    );
    await withTransaction({}, (unit) =>
      recordAudit({ actor: null, act: 'note-two', subjectKind: 'lot', subjectId: 'S-2K7F4Q' }, unit),
    );
    const { rows, nextBefore } = await page('');
    expect(rows.slice(0, 2)).toMatchObject([
      { act: 'note-two', who: 'the house', role: 'house', subject: 'lot S-2K7F4Q', detail: {} },
      {
        act: 'note-one',
        who: deskMember.displayName,
        role: 'desk',
        subject: `member ${subject.displayName}`,
        detail: { a: 1 },
      },
    ]);
    expect(nextBefore).toBeNull();
  });

  it('pages without losing acts that share a moment', async () => {
    for (let turn = 0; turn < 3; turn += 1) {
      await withTransaction({}, async (unit) => {
        for (const part of ['a', 'b', 'c'])
          await recordAudit(
            { actor: null, act: `page-${turn}-${part}`, subjectKind: 'lot', subjectId: 'S-222222' },
            unit,
          );
      });
    }
    const seen: string[] = [];
    let before: string | null = null;
    for (let pages = 0; pages < 20; pages += 1) {
      const answer: AuditAnswer = await page(`?limit=2${before === null ? '' : `&before=${before}`}`);
      seen.push(...answer.rows.map((row) => row.act));
      before = answer.nextBefore;
      if (before === null) break;
    }
    expect(seen).toHaveLength(await AuditEntry.count());
    expect(new Set(seen).size).toBe(seen.length);
  });

  it('falls with the act it tells of', async () => {
    const before = await AuditEntry.count();
    const failing = withTransaction({}, async (unit) => {
      await recordAudit({ actor: null, act: 'never', subjectKind: 'lot', subjectId: 'S-333333' }, unit);
      throw new Error('the act failed');
    });
    await expect(failing).rejects.toThrow('the act failed');
    expect(await AuditEntry.count()).toBe(before);
  });

  it('can be neither changed nor shortened by the application', async () => {
    for (const sql of ["UPDATE audit_entries SET act = 'x'", 'DELETE FROM audit_entries'])
      await expect(sequelize.query(sql)).rejects.toThrow(/denied/);
  });

  it('is read by admins alone', async () => {
    for (const role of ['member', 'desk', 'lab'] as const) {
      const visitor = await app.signIn(await buildMember({ role }));
      await visitor.get('/api/v1/admin/audit').expect(403);
    }
    await (await app.visitor()).get('/api/v1/admin/audit').expect(401);
    await admin.get('/api/v1/admin/audit?before=yesterday').expect(422);
  });
});
