import type { DayRates } from '#shared/main-metal.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import { doRanksDiffer, rankColumnsOf } from './rank-lot.ts';

const RANKED: readonly string[] = ['open', 'paused', 'reserved'];

/**
 * Writes a lot's ranking keys anew at the day's first accepted rates; answers whether they changed. Nothing that a person
 * sees of the lot changes with it. Expects the lot's lock. Throws `no-fresh-quote`.
 */
export async function rekeyLot(
  { lotId, rates }: { lotId: string; rates: DayRates },
  unit: Unit,
): Promise<boolean> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null || !RANKED.includes(lot.state)) return false;
  const { evidenceGrade: grade, priceMinor } = lot;
  const columns = await rankColumnsOf(lot, { grade, priceMinor }, unit, rates);
  if (!doRanksDiffer(lot, columns)) return false;
  await lot.update(columns, { transaction: unit.tx });
  return true;
}
