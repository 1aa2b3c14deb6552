import { Op } from 'sequelize';
import type { Locks } from '#server/database/transaction.ts';
import { Deal } from '#server/models/deal.ts';
import { Payout } from '#server/models/payout.ts';
import { ProviderTask } from '#server/models/provider-task.ts';

/** The deal of a payout at the provider: by its id, or by the order that it names when its id is not known yet. */
export async function dealIdOfPayout(payoutId: string, taskKey: string | null): Promise<string | null> {
  const payout = await Payout.findOne({ where: { providerPayoutId: payoutId }, attributes: ['dealId'] });
  if (payout !== null) return payout.dealId;
  if (taskKey === null) return null;
  const task = await ProviderTask.findOne({
    where: { kind: 'payout', idempotencyKey: taskKey },
    attributes: ['dealId'],
  });
  return task?.dealId ?? null;
}

/** Payouts of a member that failed and could be sent anew. */
export async function failedPayoutsOf(memberId: string): Promise<Payout[]> {
  return Payout.findAll({ where: { memberId, state: 'failed' }, order: [['id', 'ASC']] });
}

/** Guard rows of several deals at once, with their lots. */
export async function locksOfDeals(
  dealIds: readonly string[],
): Promise<Required<Pick<Locks, 'lots' | 'deals'>>> {
  const deals = await Deal.findAll({
    where: { id: { [Op.in]: [...dealIds] } },
    attributes: ['id', 'lotId'],
  });
  return { lots: deals.map(({ lotId }) => lotId), deals: deals.map(({ id }) => id) };
}
