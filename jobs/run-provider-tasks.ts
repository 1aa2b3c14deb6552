import { randomUUID } from 'node:crypto';
import os from 'node:os';
import { databaseNow, withTransaction } from '#server/database/transaction.ts';
import {
  claimableTaskIds,
  claimProviderTask,
  holdsLease,
} from '#server/features/provider-tasks/claim-provider-task.ts';
import { findDealLocks } from '#server/features/payments/deal-locks.ts';
import { endProviderTask, failProviderTask } from '#server/features/provider-tasks/end-provider-task.ts';
import type {
  ProviderTaskHandler,
  ProviderTaskHandlers,
} from '#server/features/provider-tasks/provider-task-handler.ts';
import { needsNewKey, PaymentProviderError } from '#server/integrations/payment-errors.ts';
import { logger } from '#server/logger.ts';
import type { ProviderTask } from '#server/models/provider-task.ts';

/** `lost`: another runner took over meanwhile and books the effect. */
export type TaskOutcome = 'done' | 'due' | 'given_up' | 'lost';

/** After so many tasks in a row without an answer a run ends: the service is down, and the next run asks again. */
const UNANSWERED_MAX = 3;
/** One run ends after so many tasks; what is left stays due. */
const TASKS_MAX = 500;
const BATCH = 50;

/** The key that the provider gets: the task's own, and numbered after the first gave way. */
function providerKey(task: ProviderTask): string {
  return task.keyVersion === 1 ? task.idempotencyKey : `${task.idempotencyKey}.${task.keyVersion}`;
}

async function finish(
  task: ProviderTask,
  handler: ProviderTaskHandler,
  result: unknown,
): Promise<TaskOutcome> {
  const locks = await findDealLocks(task.dealId);
  return withTransaction(locks ?? {}, async (unit) => {
    if (!(await holdsLease(task, unit))) return 'lost';
    const providerObjectId = await handler.finish(task, result, unit);
    await endProviderTask({ task, providerObjectId }, unit);
    return 'done';
  });
}

async function fail(task: ProviderTask, error: unknown): Promise<TaskOutcome> {
  const isKnown = error instanceof PaymentProviderError;
  const message = isKnown
    ? `${error.code}: ${error.message}`
    : error instanceof Error
      ? error.message
      : 'unknown';
  const isDefinite = needsNewKey(error);
  logger.warn(
    { err: error as Error, task: task.id, kind: task.kind, tries: task.tries },
    'provider task failed',
  );
  return withTransaction({}, (unit) =>
    failProviderTask({ task, failure: { message, isDefinite }, spread: Math.random() }, unit),
  );
}

/** One claimed task: the effect outside any transaction, then its booking in one. */
async function perform(task: ProviderTask, handler: ProviderTaskHandler): Promise<TaskOutcome> {
  try {
    const result = await handler.effect(task, { key: providerKey(task), isRepeat: task.keyVersion > 1 });
    return await finish(task, handler, result);
  } catch (error) {
    return fail(task, error);
  }
}

/**
 * Does the tasks that are due, also those that follow from them, until none is left. Any number of runners may do this at
 * once: a task belongs to whoever committed the claim, and only the newest claim books.
 */
export async function runProviderTasks(
  handlers: ProviderTaskHandlers,
  filter: { dealIds?: readonly string[] } = {},
): Promise<Record<TaskOutcome, number>> {
  const owner = `${os.hostname()}-${process.pid}-${randomUUID().slice(0, 8)}`;
  const kinds = Object.keys(handlers) as ProviderTask['kind'][];
  const counts: Record<TaskOutcome, number> = { done: 0, due: 0, given_up: 0, lost: 0 };
  let unanswered = 0;
  for (let seen = 0; seen < TASKS_MAX && unanswered < UNANSWERED_MAX;) {
    const ids = await claimableTaskIds({ kinds, limit: BATCH, ...filter }, await databaseNow());
    if (ids.length === 0) break;
    seen += ids.length;
    for (const taskId of ids) {
      const task = await withTransaction({}, (unit) => claimProviderTask({ taskId, owner }, unit));
      const handler = task === null ? undefined : handlers[task.kind];
      if (task === null || handler === undefined) continue;
      const outcome = await perform(task, handler);
      counts[outcome] += 1;
      unanswered = outcome === 'due' || outcome === 'given_up' ? unanswered + 1 : 0;
      if (unanswered >= UNANSWERED_MAX) break;
    }
  }
  return counts;
}
