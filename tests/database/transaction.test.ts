import { QueryTypes } from 'sequelize';
import { afterAll, afterEach, describe, expect, it } from 'vitest';
import '#server/models/index.ts';
import { sequelize } from '#server/database/connection.ts';
import { withIdempotentTransaction } from '#server/database/idempotent-transaction.ts';
import { databaseNow, pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { ConflictError } from '#server/app-error.ts';
import { Member } from '#server/models/index.ts';
import { buildMember } from '#tests/factories/build-member.ts';

afterEach(() => pinDatabaseTime(null));
afterAll(() => sequelize.close());

describe('withTransaction', () => {
  it('hands out the database’s time, which a test can move, and gives real time back', async () => {
    const moment = new Date('2027-03-28T01:30:00.250Z');
    pinDatabaseTime(moment);
    const pinned = await withTransaction({}, async ({ tx, now }) => {
      const rows = await sequelize.query<{ at: Date }>('SELECT NOW(3) AS at', {
        type: QueryTypes.SELECT,
        transaction: tx,
      });
      return { now, at: new Date(rows[0]!.at) };
    });
    expect(pinned).toEqual({ now: moment, at: moment });
    pinDatabaseTime(null);
    const real = await withTransaction({}, ({ now }) => Promise.resolve(now));
    expect(Math.abs(real.getTime() - Date.now())).toBeLessThan(5_000);
    expect(Math.abs((await databaseNow()).getTime() - Date.now())).toBeLessThan(5_000);
  });

  it('runs the whole of the work again after a deadlock, and both writes hold', async () => {
    const [one, other] = await Promise.all([buildMember(), buildMember()]);
    let tries = 0;
    const touch = async (first: string, second: string) =>
      withTransaction({}, async ({ tx }) => {
        tries += 1;
        for (const id of [first, second]) {
          await sequelize.query('UPDATE members SET lock_version = lock_version + 1 WHERE id = ?', {
            replacements: [id],
            transaction: tx,
          });
          await new Promise((resolve) => setTimeout(resolve, 60));
        }
      });
    await Promise.all([touch(one.id, other.id), touch(other.id, one.id)]);
    expect(tries).toBeGreaterThan(2);
    const rows = await sequelize.query<{ lock_version: number }>(
      'SELECT lock_version FROM members WHERE id IN (?, ?)',
      {
        replacements: [one.id, other.id],
        type: QueryTypes.SELECT,
      },
    );
    expect(rows.map((row) => row.lock_version)).toEqual([2, 2]);
  });

  it('leaves nothing of work that throws', async () => {
    const member = await buildMember();
    await expect(
      withTransaction({ members: [member.id] }, async ({ tx }) => {
        await Member.update({ displayName: 'Gone' }, { where: { id: member.id }, transaction: tx });
        throw new ConflictError('illegal-transition');
      }),
    ).rejects.toThrow(ConflictError);
    const after = await Member.findByPk(member.id, { rejectOnEmpty: true });
    expect(after.displayName).toBe(member.displayName);
  });
});

describe('withIdempotentTransaction', () => {
  const ticket = (actorId: string, key: string, inputHash = 'a'.repeat(64)) => ({
    actorId,
    operation: 'post /test',
    key,
    inputHash,
  });

  it('does the work once for twenty requests with one key and answers all alike', async () => {
    const member = await buildMember();
    let done = 0;
    const answers = await Promise.all(
      Array.from({ length: 20 }, () =>
        withIdempotentTransaction(
          ticket(member.id, 'twenty-at-once'),
          { members: [member.id] },
          async ({ tx }) => {
            await Member.update(
              { displayName: `Name ${(done += 1)}` },
              { where: { id: member.id }, transaction: tx },
            );
            return { status: 201, answer: { name: `Name ${done}` } };
          },
        ),
      ),
    );
    const after = await Member.findByPk(member.id, { rejectOnEmpty: true });
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
    expect((answers[0]!.answer as { name: string }).name).toBe(after.displayName);
  });

  it('refuses another input under a known key', async () => {
    const member = await buildMember();
    const work = () => Promise.resolve({ status: 200, answer: {} });
    await withIdempotentTransaction(ticket(member.id, 'reused-key'), {}, work);
    await expect(
      withIdempotentTransaction(ticket(member.id, 'reused-key', 'b'.repeat(64)), {}, work),
    ).rejects.toMatchObject({
      code: 'idempotency-key-reused',
      status: 422,
    });
  });

  it('burns a key that met a refusal of state: the same key is refused for ever', async () => {
    const member = await buildMember();
    let isOpen = false;
    const work = () => {
      if (!isOpen) throw new ConflictError('lot-not-open', 'It is closed');
      return Promise.resolve({ status: 201, answer: { ok: true } });
    };
    await expect(withIdempotentTransaction(ticket(member.id, 'burnt-key'), {}, work)).rejects.toMatchObject({
      code: 'lot-not-open',
    });
    isOpen = true;
    await expect(withIdempotentTransaction(ticket(member.id, 'burnt-key'), {}, work)).rejects.toMatchObject({
      code: 'lot-not-open',
      message: 'It is closed',
    });
    expect(await withIdempotentTransaction(ticket(member.id, 'fresh-key'), {}, work)).toEqual({
      status: 201,
      answer: { ok: true },
    });
  });
});
