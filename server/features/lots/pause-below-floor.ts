import { QueryTypes } from 'sequelize';
import { MeasureError } from '#shared/domain-error.ts';
import { percentText } from '#shared/lot-pricing.ts';
import { minorToAmount } from '#shared/money.ts';
import { measureLot } from '#shared/settlement/lot-measures.ts';
import { computeMelt } from '#shared/settlement/melt.ts';
import { isBelowFloor } from '#shared/settlement/percent-of-melt.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import { lotEntryOf } from './lot-entry.ts';
import { moveLot } from './move-lot.ts';

/** True when an outright price lies below its floor at these quotes; a metal without one leaves it open, which is no. */
async function isLotBelowFloor(lot: Lot, quotes: readonly QuoteRef[], unit: Unit): Promise<boolean> {
  if (lot.floorPercent === null || lot.priceMinor === null) return false;
  const assays = await LotAssay.findAll({
    where: { lotId: lot.id, assayVersion: lot.assayVersion },
    transaction: unit.tx,
  });
  const entry = lotEntryOf(lot, assays);
  if (entry === null) return false;
  try {
    const { valueMinor } = computeMelt(measureLot(entry), quotes);
    return isBelowFloor(lot.priceMinor, valueMinor, percentText(lot.floorPercent));
  } catch (error) {
    if (error instanceof MeasureError && error.issues.every(({ code }) => code === 'quote-missing'))
      return false;
    throw error;
  }
}

/**
 * Pauses an open lot whose price has fallen below the floor that its seller set, and tells him; answers whether it did.
 * Expects the lot's lock, which a purchase holds too.
 */
export async function pauseBelowFloor(
  { lotId, quotes }: { lotId: string; quotes: readonly QuoteRef[] },
  unit: Unit,
): Promise<boolean> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null || lot.state !== 'open' || !(await isLotBelowFloor(lot, quotes, unit))) return false;
  const floor = percentText(lot.floorPercent ?? '0');
  const price = minorToAmount(lot.priceMinor ?? 0n);
  const reason = `The metal has risen: US$ ${price} is below your floor of ${floor} % of melt.`;
  const act = { act: 'paused', actorKind: 'house', detail: { reason } } as const;
  await moveLot(lot, 'paused', { ...act, changes: { stateReason: reason } }, unit);
  await enqueueMail(
    {
      mail: 'lot-paused-floor',
      memberId: lot.sellerId,
      uniqueKey: `lot-paused-floor:${lot.id}:${unit.now.toISOString()}`,
      input: { lotCode: lot.code, lotTitle: lot.title ?? '', reason },
    },
    unit,
  );
  return true;
}

/** Open lots with a floor, a page at a time, by id. */
export async function lotIdsWithFloor(afterId: string, limit: number): Promise<string[]> {
  const rows = await sequelize.query<{ id: string }>(
    `SELECT id FROM lots WHERE state = 'open' AND floor_percent IS NOT NULL AND id > ? ORDER BY id LIMIT ?`,
    { replacements: [afterId, limit], type: QueryTypes.SELECT },
  );
  return rows.map(({ id }) => id);
}
