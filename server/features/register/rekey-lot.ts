import type { DayRates } from '#shared/main-metal.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import { doRanksDiffer, rankColumnsOf, type RankColumns } from './rank-lot.ts';

type Rekey = { lotId: string; rates: DayRates };

const RANKED: readonly string[] = ['open', 'paused', 'reserved'];

/** The lot and the keys that it should have, or null when it has them. */
async function findRekey(
  { lotId, rates }: Rekey,
  unit: Unit,
): Promise<{ lot: Lot; columns: RankColumns } | null> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null || !RANKED.includes(lot.state)) return null;
  const { evidenceGrade: grade, priceMinor } = lot;
  const columns = await rankColumnsOf(lot, { grade, priceMinor }, unit, rates);
  return doRanksDiffer(lot, columns) ? { lot, columns } : null;
}

/** Whether a lot's keys are others at these rates. Only reads, and needs no lock. Throws `no-fresh-quote`. */
export async function needsRekey(rekey: Rekey, unit: Unit): Promise<boolean> {
  return (await findRekey(rekey, unit)) !== null;
}

/**
 * Writes a lot's ranking keys anew at the day's first accepted rates; answers whether they changed. Nothing that a person
 * sees of the lot changes with it. Expects the lot's lock. Throws `no-fresh-quote`.
 */
export async function rekeyLot(rekey: Rekey, unit: Unit): Promise<boolean> {
  const found = await findRekey(rekey, unit);
  if (found === null) return false;
  await found.lot.update(found.columns, { transaction: unit.tx });
  return true;
}
