import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { PaymentEvent } from '#server/integrations/payment-readings.ts';
import { ProviderEvent } from '#server/models/provider-event.ts';
import type { ProviderEventPlan } from './provider-event-reader.ts';

export type EventOutcome = ProviderEvent['outcome'];

/**
 * Applies a message and notes it, in one transaction: its id is the row's key, so the same message cannot have its effect
 * twice. Locks: those of the plan are held by the caller. A second copy fails on the key (a unique constraint error), and
 * with it whatever it did.
 */
export async function recordProviderEvent(
  { event, plan }: { event: PaymentEvent; plan: ProviderEventPlan | null },
  unit: Unit,
): Promise<EventOutcome> {
  const row = await ProviderEvent.create(
    {
      id: event.id,
      type: event.type.slice(0, 80),
      objectId: event.objectId,
      accountId: event.accountId,
      providerCreatedAt: event.createdAt,
      receivedAt: unit.now,
      outcome: 'ignored',
    },
    { transaction: unit.tx },
  );
  if (plan === null) return 'ignored';
  const outcome = (await plan.apply(unit)) ? 'applied' : 'no_effect';
  await row.update({ outcome }, { transaction: unit.tx });
  return outcome;
}

/** Counts another copy of a message that was dealt with; false when it is not known yet. */
export async function countProviderEvent({ eventId }: { eventId: string }, unit: Unit): Promise<boolean> {
  const changed = await sequelize.query(
    'UPDATE provider_events SET deliveries = deliveries + 1 WHERE id = ?',
    { replacements: [eventId], type: QueryTypes.BULKUPDATE, transaction: unit.tx },
  );
  return (changed as unknown as number) === 1;
}
