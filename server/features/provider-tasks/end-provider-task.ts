import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { Deal } from '#server/models/deal.ts';
import { ProviderTask } from '#server/models/provider-task.ts';
import { holdsLease } from './claim-provider-task.ts';

const BACKOFF_SECONDS_FIRST = 5;
const BACKOFF_SECONDS_MAX = 6 * 3600;
/** With the longest pause reached after 13 tries: about 30 days. Then a person looks at it. */
export const TASK_TRIES_MAX = 130;

/** Seconds until the next try; `spread` between 0 and 1 keeps tasks of one outage apart. */
export function backoffSeconds(tries: number, spread: number): number {
  const pause = Math.min(BACKOFF_SECONDS_MAX, BACKOFF_SECONDS_FIRST * 2 ** Math.min(tries - 1, 20));
  return Math.ceil(pause * (0.75 + spread / 2));
}

/** Notes that the effect is booked. The caller has checked the lease in this transaction. */
export async function endProviderTask(
  { task, providerObjectId }: { task: ProviderTask; providerObjectId: string | null },
  { tx, now }: Unit,
): Promise<void> {
  await ProviderTask.update(
    { state: 'done', doneAt: now, providerObjectId, leaseUntil: null, leaseOwner: null, lastError: null },
    { where: { id: task.id }, transaction: tx },
  );
}

export type TaskFailure = { message: string; isDefinite: boolean };

/**
 * Puts a task back for a later try, or gives it up after the last and tells the admins by the audit trail. A definite
 * refusal burnt its key at the provider, so the next try has another; without an answer the key stays.
 */
export async function failProviderTask(
  { task, failure, spread }: { task: ProviderTask; failure: TaskFailure; spread: number },
  unit: Unit,
): Promise<'due' | 'given_up' | 'lost'> {
  if (!(await holdsLease(task, unit))) return 'lost';
  const isLast = task.tries >= TASK_TRIES_MAX;
  const nextAt = new Date(unit.now.getTime() + backoffSeconds(task.tries, spread) * 1000);
  await ProviderTask.update(
    {
      state: isLast ? 'given_up' : 'due',
      nextAt,
      leaseUntil: null,
      leaseOwner: null,
      lastError: failure.message.slice(0, 500),
      ...(failure.isDefinite ? { keyVersion: task.keyVersion + 1, keySince: null } : {}),
    },
    { where: { id: task.id }, transaction: unit.tx },
  );
  if (!isLast) return 'due';
  const deal = await Deal.findByPk(task.dealId, { attributes: ['code'], transaction: unit.tx });
  await recordAudit(
    {
      actor: null,
      act: 'give-up-provider-task',
      subjectKind: 'deal',
      subjectId: deal?.code ?? task.dealId,
      detail: { kind: task.kind, tries: task.tries, lastError: failure.message.slice(0, 500) },
    },
    unit,
  );
  return 'given_up';
}
