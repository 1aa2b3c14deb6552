import { daysLater } from '#shared/calendar-day.ts';
import type { EvidenceGrade } from '#shared/assay/evidence.ts';
import { LOT_OPEN_DAYS_MAX } from '#shared/limits.ts';
import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot, recordLotEvent } from './move-lot.ts';
import { isSellerSuspended } from './pause-lots-of.ts';
import { rankColumnsOf } from '#server/features/register/rank-lot.ts';

export type OpenLotInput = {
  /** Read under its lock. */
  lot: Lot;
  grade: EvidenceGrade;
  detail?: Record<string, unknown>;
};

/** When an opened lot closes: on the day that the seller chose, at most 90 days after opening. */
function closingMoment(lot: Lot, now: Date): Date {
  const latest = daysLater(now, LOT_OPEN_DAYS_MAX);
  return lot.closesAt !== null && lot.closesAt < latest ? lot.closesAt : latest;
}

/**
 * What follows from the desk's finding on a submitted lot. A certified lot that settles on its stated assay opens: grade,
 * ranking keys at the day's rates, and dates are written with the change of state. Any other grade is written down and the
 * lot stays submitted, marked examined: it would settle on a final assay. Expects the lot's lock.
 *
 * Throws `illegal-transition`, also while the seller is suspended, `deadline-passed` when the seller's closing day is over, `no-fresh-quote`.
 */
export async function openLot(
  { lot, grade, detail = {} }: OpenLotInput,
  unit: Unit,
  actor: Pick<Actor, 'id'>,
): Promise<Lot> {
  if (lot.state !== 'submitted') {
    throw new ConflictError('illegal-transition', 'Only a submitted lot can be opened.');
  }
  const who = { actorKind: 'desk', actorId: actor.id, detail: { ...detail, grade } } as const;
  if (grade !== 'certified' || lot.settlesOn !== 'stated') {
    return recordLotEvent(lot, { act: 'examined', ...who, changes: { evidenceGrade: grade } }, unit);
  }
  const closesAt = closingMoment(lot, unit.now);
  if (closesAt <= unit.now) {
    throw new ConflictError('deadline-passed', 'The closing day is over; return the lot for another one.');
  }
  if (await isSellerSuspended(lot, unit)) {
    throw new ConflictError('illegal-transition', 'The seller’s account is suspended; the lot cannot open.');
  }
  const ranks = await rankColumnsOf(lot, { grade, priceMinor: lot.priceMinor }, unit);
  const changes = { evidenceGrade: grade, ...ranks, openedAt: unit.now, closesAt, stateReason: null };
  return moveLot(lot, 'open', { act: 'opened', ...who, changes }, unit);
}
