import { Op, QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import { ProviderTask } from '#server/models/provider-task.ts';

/** Longer than the slowest effect: three calls of three attempts each. */
export const TASK_LEASE_SECONDS = 180;
/** The provider forgets a key after 24 hours; an hour before that ours counts as aged. */
const KEY_HOURS_MAX = 23;

/** What waits to be done, the oldest first: due by its time, or claimed by a runner whose lease ran out. */
export async function claimableTaskIds(
  filter: { kinds: readonly ProviderTask['kind'][]; dealIds?: readonly string[]; limit: number },
  now: Date,
): Promise<string[]> {
  const rows = await ProviderTask.findAll({
    attributes: ['id'],
    where: {
      kind: [...filter.kinds],
      ...(filter.dealIds === undefined ? {} : { dealId: [...filter.dealIds] }),
      [Op.or]: [
        { state: 'due', nextAt: { [Op.lte]: now } },
        { state: 'claimed', leaseUntil: { [Op.lt]: now } },
      ],
    },
    order: [
      ['nextAt', 'ASC'],
      ['id', 'ASC'],
    ],
    limit: filter.limit,
  });
  return rows.map(({ id }) => id);
}

/**
 * Takes a task for one runner: one conditional UPDATE, to be committed before any effect. The token fences off a slower
 * runner; a key that the provider may have forgotten gives way to the next. Answers null when another was first.
 */
export async function claimProviderTask(
  { taskId, owner }: { taskId: string; owner: string },
  { tx, now }: Unit,
): Promise<ProviderTask | null> {
  const leaseUntil = new Date(now.getTime() + TASK_LEASE_SECONDS * 1000);
  const agedBefore = new Date(now.getTime() - KEY_HOURS_MAX * 3_600_000);
  const claimed = await sequelize.query(
    `UPDATE provider_tasks
        SET state = 'claimed', lease_owner = :owner, lease_until = :leaseUntil, lease_token = lease_token + 1,
            tries = tries + 1, key_version = IF(key_since < :agedBefore, key_version + 1, key_version),
            key_since = IF(key_since IS NULL OR key_since < :agedBefore, :now, key_since), updated_at = :now
      WHERE id = :taskId
        AND ((state = 'due' AND next_at <= :now) OR (state = 'claimed' AND lease_until < :now))`,
    {
      replacements: { taskId, owner, leaseUntil, agedBefore, now },
      type: QueryTypes.BULKUPDATE,
      transaction: tx,
    },
  );
  return (claimed as unknown as number) === 1 ? ProviderTask.findByPk(taskId, { transaction: tx }) : null;
}

/** True while the token of a claim is still the newest; the row stays locked until commit. */
export async function holdsLease(claim: ProviderTask, { tx }: Unit): Promise<boolean> {
  const task = await ProviderTask.findByPk(claim.id, { lock: tx.LOCK.UPDATE, transaction: tx });
  return task !== null && task.state === 'claimed' && task.leaseToken === claim.leaseToken;
}
