import { setTimeout as sleep } from 'node:timers/promises';
import { QueryTypes, type Transaction } from 'sequelize';
import { sequelize } from './connection.ts';
import { driverCode } from './driver-error.ts';

/** What every command is handed: the open transaction and the database's own clock, read once after the locks. */
export type Unit = { tx: Transaction; now: Date };

/** Guard rows to take, always in the order members → lots → deals, each by ascending id. */
export type Locks = { members?: readonly string[]; lots?: readonly string[]; deals?: readonly string[] };

const TRIES_MAX = 5;
const RETRIED = new Set(['ER_LOCK_DEADLOCK', 'ER_LOCK_WAIT_TIMEOUT', 'ER_CHECKREAD']);
const LOCK_ORDER = ['members', 'lots', 'deals'] as const;

/**
 * Moves the database clock of the transactions of this process; only tests set it. `null` gives real time back.
 * `SET timestamp` is per session, so it is set (or reset) at the start of every transaction on a pooled connection.
 */
let pinnedTime: Date | null = null;
export function pinDatabaseTime(moment: Date | null): void {
  pinnedTime = moment;
}

/**
 * The guard rows are locked *and written*: on a cluster a lock that is not followed by a write is not certified, and two
 * nodes would both commit.
 */
async function takeLocks(locks: Locks, tx: Transaction): Promise<void> {
  for (const table of LOCK_ORDER) {
    const ids = [...new Set(locks[table] ?? [])].sort();
    for (const id of ids) {
      await sequelize.query(`SELECT id FROM ${table} WHERE id = ? FOR UPDATE`, {
        replacements: [id],
        type: QueryTypes.SELECT,
        transaction: tx,
      });
      await sequelize.query(`UPDATE ${table} SET lock_version = lock_version + 1 WHERE id = ?`, {
        replacements: [id],
        type: QueryTypes.UPDATE,
        transaction: tx,
      });
    }
  }
}

async function readNow(tx: Transaction): Promise<Date> {
  const rows = await sequelize.query<{ now: Date | string }>('SELECT NOW(3) AS now', {
    type: QueryTypes.SELECT,
    transaction: tx,
  });
  return new Date(rows[0]!.now);
}

async function attempt<T>(locks: Locks, work: (unit: Unit) => Promise<T>): Promise<T> {
  return sequelize.transaction(async (tx) => {
    const stamp = pinnedTime === null ? 'DEFAULT' : String(pinnedTime.getTime() / 1000);
    await sequelize.query(`SET timestamp = ${stamp}`, { transaction: tx });
    await takeLocks(locks, tx);
    return work({ tx, now: await readNow(tx) });
  });
}

/**
 * The only way to write. Takes the guard rows in one order everywhere, reads the database's time, runs `work`, commits.
 * A deadlock, a lock wait that ran out or a changed snapshot rolls back and runs the whole of `work` again, at most five
 * times with jitter; then it fails aloud. `work` must therefore reach nothing outside the database: no hosted service, no
 * mail, no file.
 */
export async function withTransaction<T>(locks: Locks, work: (unit: Unit) => Promise<T>): Promise<T> {
  for (let tries = 1; ; tries += 1) {
    try {
      return await attempt(locks, work);
    } catch (error) {
      const code = driverCode(error);
      if (code === null || !RETRIED.has(code) || tries >= TRIES_MAX) throw error;
      await sleep(10 * 2 ** tries * (0.5 + Math.random()));
    }
  }
}

/** The database's clock outside a transaction, for reads that show what is left of a deadline. */
export async function databaseNow(): Promise<Date> {
  if (pinnedTime !== null) return pinnedTime;
  // Unlike NOW, it does not follow a `SET timestamp` that an earlier transaction left on the pooled connection.
  const rows = await sequelize.query<{ now: Date | string }>('SELECT SYSDATE(3) AS now', {
    type: QueryTypes.SELECT,
  });
  return new Date(rows[0]!.now);
}
