import { MeasureError } from '#shared/domain-error.ts';
import { assertLotTransition, LIVE_LOT_STATES, type LotState } from '#shared/lot-states.ts';
import { ConflictError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Certificate } from '#server/models/certificate.ts';
import type { Lot } from '#server/models/lot.ts';
import { LotEvent } from '#server/models/lot-event.ts';

export type LotAct = {
  /** What happened, as a stable word; the presenter makes the sentence. */
  act: string;
  actorKind: LotEvent['actorKind'];
  actorId?: string | null;
  detail?: Record<string, unknown>;
};

type LotChanges = Parameters<Lot['update']>[0];

const ENDED: readonly LotState[] = ['closed', 'withdrawn'];

function assertMayBecome(from: LotState, to: LotState): void {
  try {
    assertLotTransition(from, to);
  } catch (error) {
    if (error instanceof MeasureError) throw new ConflictError('illegal-transition', error.message);
    throw error;
  }
}

async function writeEvent(
  lot: Lot,
  { act, actorKind, actorId, detail }: LotAct,
  states: { fromState: string | null; toState: string | null },
  unit: Unit,
): Promise<void> {
  await LotEvent.create(
    {
      id: newId(),
      lotId: lot.id,
      act,
      actorKind,
      actorId: actorId ?? null,
      at: unit.now,
      ...states,
      detail: detail ?? {},
    },
    { transaction: unit.tx },
  );
}

/**
 * The only way a lot changes its state: asserts the transition, updates the row and writes the dated event. A lot that is
 * no longer live frees its certificate for another lot. The caller holds the lot's lock.
 *
 * Throws `illegal-transition`.
 */
export async function moveLot(
  lot: Lot,
  toState: LotState,
  { changes, ...act }: LotAct & { changes?: LotChanges },
  unit: Unit,
): Promise<Lot> {
  const fromState = lot.state;
  assertMayBecome(fromState, toState);
  const ended = ENDED.includes(toState) ? { endedAt: unit.now } : {};
  await lot.update({ ...ended, ...changes, state: toState }, { transaction: unit.tx });
  if (!LIVE_LOT_STATES.includes(toState)) {
    await Certificate.update({ liveKey: null }, { where: { lotId: lot.id }, transaction: unit.tx });
  }
  await writeEvent(lot, act, { fromState, toState }, unit);
  return lot;
}

/** Writes an event that leaves the state as it is. The caller holds the lot's lock. */
export async function recordLotEvent(
  lot: Lot,
  { changes, ...act }: LotAct & { changes?: LotChanges },
  unit: Unit,
): Promise<Lot> {
  if (changes !== undefined) await lot.update(changes, { transaction: unit.tx });
  await writeEvent(lot, act, { fromState: null, toState: null }, unit);
  return lot;
}
