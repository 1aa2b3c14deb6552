import { MeasureError } from '#shared/domain-error.ts';
import { assertDealTransition, isDealEnded, type DealState } from '#shared/deal-states.ts';
import { ConflictError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { heldMinor as readHeldMinor } from '#server/features/ledger/ledger-queries.ts';
import type { Deal } from '#server/models/deal.ts';
import { DealEvent } from '#server/models/deal-event.ts';

export type DealActorKind = 'buyer' | 'seller' | 'desk' | 'provider' | 'carrier' | 'clock' | 'house';

export type DealAct = {
  /** What happened, as a stable word; the presenter makes the sentence. */
  act: string;
  actorKind: DealActorKind;
  actorId?: string | null;
  detail?: Record<string, unknown>;
  /** What is held after this act; read from the ledger when left out. */
  heldMinor?: bigint;
};

type DealChanges = Parameters<Deal['update']>[0];

async function writeEvent(
  deal: Deal,
  { act, actorKind, actorId, detail, heldMinor }: DealAct,
  states: { fromState: string | null; toState: string | null },
  unit: Unit,
): Promise<void> {
  const last = await DealEvent.max<number | null, DealEvent>('sequence', {
    where: { dealId: deal.id },
    transaction: unit.tx,
  });
  await DealEvent.create(
    {
      id: newId(),
      dealId: deal.id,
      sequence: (last ?? 0) + 1,
      act,
      actorKind,
      actorId: actorId ?? null,
      at: unit.now,
      ...states,
      heldMinor: heldMinor ?? (await readHeldMinor(deal.id, unit.tx)),
      detail: detail ?? {},
    },
    { transaction: unit.tx },
  );
}

function assertMayBecome(from: DealState, to: DealState): void {
  try {
    assertDealTransition(from, to);
  } catch (error) {
    if (error instanceof MeasureError) throw new ConflictError('illegal-transition', error.message);
    throw error;
  }
}

/**
 * The only way a deal changes its state: asserts the transition, updates the row, frees the lot for another deal when this
 * one has ended, and writes the dated event with what is held. The caller holds the deal's lock and has posted the
 * ledger's entries before.
 *
 * Throws `illegal-transition`.
 */
export async function moveDeal(
  deal: Deal,
  toState: DealState,
  { changes, ...act }: DealAct & { changes?: DealChanges },
  unit: Unit,
): Promise<Deal> {
  const fromState = deal.state;
  assertMayBecome(fromState, toState);
  const isEnded = isDealEnded(toState);
  await deal.update(
    {
      ...changes,
      state: toState,
      liveLotId: isEnded ? null : deal.lotId,
      ...(isEnded ? { endedAt: unit.now } : {}),
    },
    { transaction: unit.tx },
  );
  await writeEvent(deal, act, { fromState, toState }, unit);
  return deal;
}

/** Writes the first event of a deal that has just been made. */
export async function recordAgreement(deal: Deal, act: DealAct, unit: Unit): Promise<void> {
  await writeEvent(deal, act, { fromState: null, toState: deal.state }, unit);
}

/** Writes an event that leaves the state as it is. The caller holds the deal's lock. */
export async function recordDealEvent(
  deal: Deal,
  { changes, ...act }: DealAct & { changes?: DealChanges },
  unit: Unit,
): Promise<Deal> {
  if (changes !== undefined) await deal.update(changes, { transaction: unit.tx });
  await writeEvent(deal, act, { fromState: null, toState: null }, unit);
  return deal;
}
