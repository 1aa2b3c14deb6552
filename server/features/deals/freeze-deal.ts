import { HOLDING_DEAL_STATES } from '#shared/deal-states.ts';
import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { recordDealEvent } from './move-deal.ts';
import { assertState, readDealForDesk } from './read-own-deal.ts';

/**
 * Stops a deal while money is held for it: no act of its sides, no ruling, no clock. A flag, not a state.
 *
 * Locks the deal. Throws `not-found`, `own-case`, `illegal-transition`, `deal-frozen` when it is frozen already.
 */
export async function freezeDeal(
  input: { dealId: string; reason: string },
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const deal = await readDealForDesk(input.dealId, unit, actor);
  assertState(deal, HOLDING_DEAL_STATES, 'Only a deal that money is held for can be frozen.');
  if (deal.frozenAt !== null) throw new ConflictError('deal-frozen');
  const { reason } = input;
  await recordAudit(
    { actor, act: 'freeze-deal', subjectKind: 'deal', subjectId: deal.code, detail: { reason } },
    unit,
  );
  return recordDealEvent(
    deal,
    {
      act: 'frozen',
      actorKind: 'desk',
      actorId: actor.id,
      detail: { reason },
      changes: { frozenAt: unit.now },
    },
    unit,
  );
}

/** A clock that began during the freeze is moved only by what of the freeze it has seen. */
function moved(deadline: Date | null, clockBegan: Date | null, frozenAt: Date, now: Date): Date | null {
  if (deadline === null) return null;
  const from = Math.max(frozenAt.getTime(), clockBegan?.getTime() ?? 0);
  return new Date(deadline.getTime() + now.getTime() - from);
}

/**
 * Lifts a freeze and moves the clock that runs in the present state by the length of the freeze.
 *
 * Locks the deal. Throws `not-found`, `own-case`, `illegal-transition` when it is not frozen.
 */
export async function unfreezeDeal(dealId: string, unit: Unit, actor: Actor): Promise<Deal> {
  const deal = await readDealForDesk(dealId, unit, actor);
  const { frozenAt } = deal;
  if (frozenAt === null) throw new ConflictError('illegal-transition', 'This deal is not frozen.');
  await recordAudit({ actor, act: 'unfreeze-deal', subjectKind: 'deal', subjectId: deal.code }, unit);
  return recordDealEvent(
    deal,
    {
      act: 'unfrozen',
      actorKind: 'desk',
      actorId: actor.id,
      changes: {
        frozenAt: null,
        ...(deal.state === 'funded' ? { shipBy: moved(deal.shipBy, deal.fundedAt, frozenAt, unit.now) } : {}),
        ...(deal.state === 'shipped'
          ? { arriveBy: moved(deal.arriveBy, deal.shippedAt, frozenAt, unit.now) }
          : {}),
        ...(deal.state === 'delivered'
          ? { inspectBy: moved(deal.inspectBy, deal.deliveredAt, frozenAt, unit.now) }
          : {}),
      },
    },
    unit,
  );
}
