import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { ProviderTask } from '#server/models/provider-task.ts';

export type ProviderTaskOrder = {
  dealId: string;
  kind: ProviderTask['kind'];
  payload: Record<string, unknown>;
  /** Names the effect for ever, such as `transfer:D-2K7F4Q:v1`; also the key that the provider gets. */
  idempotencyKey: string;
  dueAt?: Date;
};

/**
 * Orders an effect at a hosted service, in the transaction that it follows from; the job does it after commit. A key that
 * is there already is left as it is. The caller holds the deal's lock. Answers the task's id.
 */
export async function enqueueProviderTask(order: ProviderTaskOrder, unit: Unit): Promise<string> {
  const known = await ProviderTask.findOne({
    where: { idempotencyKey: order.idempotencyKey },
    attributes: ['id'],
    transaction: unit.tx,
  });
  if (known !== null) return known.id;
  const task = await ProviderTask.create(
    {
      id: newId(),
      dealId: order.dealId,
      kind: order.kind,
      idempotencyKey: order.idempotencyKey,
      state: 'due',
      payload: order.payload,
      nextAt: order.dueAt ?? unit.now,
    },
    { transaction: unit.tx },
  );
  return task.id;
}
