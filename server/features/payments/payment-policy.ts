import { isDeskStaff, type Role } from '#shared/roles.ts';
import type { Deal } from '#server/models/deal.ts';

type Who = { id: string; role: Role };
type Sides = Pick<Deal, 'buyerId' | 'sellerId'>;

/** The payment shows where the deal does: to its sides and to the desk. */
export function canSeePayment(actor: Who, deal: Sides): boolean {
  return actor.id === deal.buyerId || actor.id === deal.sellerId || isDeskStaff(actor.role);
}

/** Only the buyer pays, and only the buyer comes back from the provider's page. */
export function canPay(actor: Who, deal: Sides): boolean {
  return actor.id === deal.buyerId;
}
