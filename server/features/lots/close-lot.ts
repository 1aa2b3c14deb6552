import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import { moveLot } from './move-lot.ts';

/**
 * Closes a lot whose day has come; answers whether it did. A lot that was reserved, sold or moved meanwhile is left alone,
 * and one that comes back to open after its day is closed by the next run. Expects the lot's lock.
 */
export async function closeLot({ lotId }: { lotId: string }, unit: Unit): Promise<boolean> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  const isOnOffer = lot !== null && (lot.state === 'open' || lot.state === 'paused');
  if (!isOnOffer || lot.closesAt === null || lot.closesAt > unit.now) return false;
  const changes = { stateReason: 'Its closing day has come.' };
  await moveLot(lot, 'closed', { act: 'closed', actorKind: 'house', changes }, unit);
  return true;
}

/** Lots on offer whose closing day has come, by the index on it. */
export async function lotIdsToClose(now: Date, limit: number): Promise<string[]> {
  const rows = await sequelize.query<{ id: string }>(
    `SELECT id FROM lots WHERE state IN ('open', 'paused') AND closes_at <= ? ORDER BY closes_at LIMIT ?`,
    { replacements: [now, limit], type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.id);
}
