import type { Locks } from '#server/database/transaction.ts';
import { Deal } from '#server/models/deal.ts';

/** The guard rows of everything that happens to a deal: its lot, then itself. */
export function locksOf(deal: Pick<Deal, 'id' | 'lotId'>): Locks {
  return { lots: [deal.lotId], deals: [deal.id] };
}

export async function findDealLocks(dealId: string): Promise<Locks | null> {
  const deal = await Deal.findByPk(dealId, { attributes: ['id', 'lotId'] });
  return deal === null ? null : locksOf(deal);
}
