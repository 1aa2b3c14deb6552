import type { Locks, Unit } from '#server/database/transaction.ts';
import type { PaymentEvent } from '#server/integrations/payment-readings.ts';

/** What is to be done about a message: the rows to lock, and the change itself. `apply` answers whether it changed anything. */
export type ProviderEventPlan = { locks: Locks; apply: (unit: Unit) => Promise<boolean> };

/**
 * Reads a message outside any transaction, asking the provider for the object as it is now; null when it is about nothing of
 * ours. Messages come more than once, late and in any order, so a plan must come to the same in every order.
 */
export type ProviderEventReader = (event: PaymentEvent) => Promise<ProviderEventPlan | null>;
