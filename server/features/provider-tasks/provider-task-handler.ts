import type { Unit } from '#server/database/transaction.ts';
import type { ProviderTask } from '#server/models/provider-task.ts';

/**
 * How one kind of task is done. `effect` runs outside any transaction, may run more than once and must then come to the
 * same: it passes `key` on to the provider, and where `isRepeat` is set it looks for what an earlier key has done before it
 * does anything. `finish` books the result with the lot's and the deal's guard rows locked, exactly once.
 */
export type ProviderTaskHandler<Result = unknown> = {
  effect: (task: ProviderTask, call: { key: string; isRepeat: boolean }) => Promise<Result>;
  /** Answers the id of the object at the provider, for the task's row. */
  finish: (task: ProviderTask, result: Result, unit: Unit) => Promise<string | null>;
};

export type ProviderTaskHandlers = Readonly<
  Partial<Record<ProviderTask['kind'], ProviderTaskHandler<unknown>>>
>;

/** Keeps effect and finish of one result together; the registry stores them erased. */
export function defineProviderTask<Result>(
  handler: ProviderTaskHandler<Result>,
): ProviderTaskHandler<unknown> {
  return handler as unknown as ProviderTaskHandler<unknown>;
}
