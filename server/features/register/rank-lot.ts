import { QueryTypes } from 'sequelize';
import { dec } from '#shared/decimal.ts';
import { dayOf } from '#shared/calendar-day.ts';
import { MeasureError } from '#shared/domain-error.ts';
import type { EvidenceGrade } from '#shared/assay/evidence.ts';
import { rankingKeys, type DayRates } from '#shared/main-metal.ts';
import { ConflictError, invariant } from '#server/app-error.ts';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import { dayRates } from '#server/features/quotes/quote-queries.ts';
import type { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import { lotEntryOf } from '#server/features/lots/lot-entry.ts';

/** The columns that a lot is ranked by; written with the lot or once a day, never by a quote. */
export type RankColumns = Pick<Lot, 'mainMetal' | 'mainFinenessPermille' | 'mainFineGrams' | 'rankPrice'>;

/**
 * Computes a lot's static ranking keys at the day's first accepted rates, for a grade and price that may be about to
 * change. Throws `no-fresh-quote` when a metal paid for has never had a rate.
 */
export async function rankColumnsOf(
  lot: Lot,
  { grade, priceMinor }: { grade: EvidenceGrade; priceMinor: bigint | null },
  unit: Unit,
  rates?: DayRates,
): Promise<RankColumns> {
  const assays = await LotAssay.findAll({
    where: { lotId: lot.id, assayVersion: lot.assayVersion },
    transaction: unit.tx,
  });
  const entry = lotEntryOf(lot, assays);
  invariant(entry !== null, 'a lot that is ranked has its mass and assay');
  const dayRatesNow = rates ?? (await dayRates(dayOf(unit.now)));
  try {
    const keys = rankingKeys({ ...entry, priceMinor, grade, dayRates: dayRatesNow });
    const main = assays.find((assay) => assay.element === keys.mainMetal);
    invariant(main !== undefined, 'the main metal is one of the assay');
    return {
      mainMetal: keys.mainMetal,
      mainFinenessPermille: main.finenessPermille,
      mainFineGrams: keys.mainFineGrams,
      rankPrice: keys.pricePerFineGram,
    };
  } catch (error) {
    if (error instanceof MeasureError && error.code === 'quote-missing') {
      throw new ConflictError('no-fresh-quote', error.message);
    }
    throw error;
  }
}

function isSame(left: string | null, right: string | null): boolean {
  if (left === null || right === null) return left === right;
  return dec(left).eq(right);
}

/** True when the keys say something else than the row; a row that says the same is left alone. */
export function doRanksDiffer(lot: RankColumns, columns: RankColumns): boolean {
  return (
    lot.mainMetal !== columns.mainMetal ||
    !isSame(lot.mainFinenessPermille, columns.mainFinenessPermille) ||
    !isSame(lot.mainFineGrams, columns.mainFineGrams) ||
    !isSame(lot.rankPrice, columns.rankPrice)
  );
}

/** Lots on offer or held back from it that more than one metal is paid for in: only their keys depend on the day. */
export async function lotIdsThatDriftDaily(afterId: string, limit: number): Promise<string[]> {
  const rows = await sequelize.query<{ id: string }>(
    `SELECT lots.id FROM lots
     JOIN lot_assays ON lot_assays.lot_id = lots.id AND lot_assays.assay_version = lots.assay_version
     WHERE lots.state IN ('open', 'paused', 'reserved') AND lots.id > ? AND lot_assays.is_paid_for = 1
     GROUP BY lots.id HAVING COUNT(*) > 1 ORDER BY lots.id LIMIT ?`,
    { replacements: [afterId, limit], type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.id);
}
