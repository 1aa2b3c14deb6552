import { randomUUID } from 'node:crypto';
import os from 'node:os';
import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { logger } from '#server/logger.ts';
import { JobLease } from '#server/models/job-lease.ts';

export type JobContext = { now: Date; log: typeof logger };
export type Job = {
  name: string;
  /** How often the scheduler pokes it; what is due stands in tables, so a missed poke loses nothing. */
  everySeconds: number;
  run: (context: JobContext) => Promise<Record<string, unknown>>;
};

const OWNER = `${os.hostname()}-${process.pid}-${randomUUID().slice(0, 8)}`;
const LEASE_SECONDS = 120;

export function defineJob(job: Job): Job {
  return job;
}

/** The lease is a committed row with a fencing token, taken before any effect; a lost runner's lease runs out by itself. */
async function takeLease(name: string): Promise<{ token: number; now: Date } | null> {
  return withTransaction({}, async ({ tx, now }) => {
    await sequelize.query(
      `INSERT INTO job_leases (name, token, created_at, updated_at) VALUES (?, 0, NOW(3), NOW(3))
       ON DUPLICATE KEY UPDATE name = name`,
      { replacements: [name], type: QueryTypes.INSERT, transaction: tx },
    );
    const lease = await JobLease.findByPk(name, { lock: tx.LOCK.UPDATE, transaction: tx });
    if (lease === null || (lease.leasedUntil !== null && lease.leasedUntil > now)) return null;
    const token = lease.token + 1;
    await lease.update(
      {
        owner: OWNER,
        token,
        leasedUntil: new Date(now.getTime() + LEASE_SECONDS * 1000),
        lastStartedAt: now,
      },
      { transaction: tx },
    );
    return { token, now };
  });
}

async function giveBack(
  name: string,
  token: number,
  outcome: 'done' | 'failed',
  detail: unknown,
): Promise<void> {
  await withTransaction({}, async ({ tx, now }) => {
    await JobLease.update(
      { leasedUntil: null, owner: null, lastFinishedAt: now, lastOutcome: outcome, lastDetail: detail },
      { where: { name, token }, transaction: tx },
    );
  });
}

/** Runs a job once unless another runner has it; answers what it did, or null when it was taken. */
export async function runJob(job: Job): Promise<Record<string, unknown> | null> {
  const lease = await takeLease(job.name);
  if (lease === null) return null;
  const log = logger.child({ job: job.name });
  try {
    const detail = await job.run({ now: lease.now, log });
    await giveBack(job.name, lease.token, 'done', detail);
    return detail;
  } catch (error) {
    log.error({ err: error as Error }, 'job failed');
    await giveBack(job.name, lease.token, 'failed', {
      message: error instanceof Error ? error.message : 'unknown',
    });
    throw error;
  }
}
