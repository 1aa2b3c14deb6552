import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import { inspectByFrom } from './deadlines.ts';
import { mailParcelDelivered } from './deal-mails.ts';
import { moveDeal, type DealAct } from './move-deal.ts';

export type Delivery = Pick<DealAct, 'act' | 'actorKind' | 'actorId'> & {
  deliveredAt: Date;
  /** Null where the buyer confirmed an unsigned delivery. */
  signedBy: string | null;
};

/**
 * Makes a deal delivered and opens the inspection. The five days run from now, when the buyer is told, and not from what
 * the carrier says of the past.
 *
 * The caller holds the deal's lock. Throws `illegal-transition`.
 */
export async function deliverDeal(
  deal: Deal,
  { deliveredAt, signedBy, ...act }: Delivery,
  unit: Unit,
): Promise<Deal> {
  await moveDeal(
    deal,
    'delivered',
    {
      ...act,
      detail: signedBy === null ? {} : { signedBy },
      changes: { deliveredAt, inspectBy: inspectByFrom(unit.now) },
    },
    unit,
  );
  await mailParcelDelivered(deal, signedBy, unit);
  return deal;
}
