import type { TakeUpRequest } from '#shared/schemas/deals.ts';
import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { mailDealTakenUp } from './deal-mails.ts';
import { isInspectionOver } from './deal-policy.ts';
import { moveDeal } from './move-deal.ts';
import { assertNotFrozen, assertState, readDealForDesk } from './read-own-deal.ts';

/**
 * The desk takes up a delivered deal whose buyer has neither accepted nor contested within his days to inspect: it is then
 * contested, with nobody's word against the lot, and waits for a ruling. No money moves. Never on a deal of one's own.
 *
 * Locks the deal. Throws `not-found`, `own-case`, `deal-frozen`, `illegal-transition` in another state or too early.
 */
export async function takeUpDeal(
  input: TakeUpRequest & { dealId: string },
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const { reason } = input;
  const deal = await readDealForDesk(input.dealId, unit, actor);
  assertState(deal, ['delivered'], 'The desk takes up a deal that was delivered and not answered.');
  assertNotFrozen(deal);
  if (!isInspectionOver(deal, unit.now)) {
    throw new ConflictError(
      'illegal-transition',
      `The buyer may still inspect it, until ${deal.inspectBy?.toISOString() ?? 'the deadline'}.`,
    );
  }
  await recordAudit(
    { actor, act: 'take-up-deal', subjectKind: 'deal', subjectId: deal.code, detail: { reason } },
    unit,
  );
  await moveDeal(
    deal,
    'contested',
    {
      act: 'taken-up',
      actorKind: 'desk',
      actorId: actor.id,
      detail: { reason },
      changes: { contestedAt: unit.now, contestReason: 'not_answered', contestNote: reason },
    },
    unit,
  );
  await mailDealTakenUp(deal, reason, unit);
  return deal;
}
