import type { RulingRequest } from '#shared/schemas/deals.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { cancelDeal } from './cancel-deal.ts';
import { mailDealRuled } from './deal-mails.ts';
import { assertNotFrozen, assertState, readDealForDesk } from './read-own-deal.ts';
import { settleDeal } from './settle-deal.ts';

/**
 * The desk ends a contested deal: refund in full (cancelled), or release (settled), with a reason that both sides read. Never
 * on a deal of one's own.
 *
 * Locks lot and deal. Throws `not-found`, `own-case`, `deal-frozen`, `illegal-transition`.
 */
export async function ruleDeal(
  input: RulingRequest & { dealId: string },
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const { ruling, reason } = input;
  const deal = await readDealForDesk(input.dealId, unit, actor);
  assertState(deal, ['contested'], 'The desk rules on contested deals only.');
  assertNotFrozen(deal);
  const desk = { actorKind: 'desk', actorId: actor.id } as const;
  await recordAudit(
    { actor, act: 'rule-deal', subjectKind: 'deal', subjectId: deal.code, detail: { ruling, reason } },
    unit,
  );
  if (ruling === 'release') {
    await settleDeal(deal, { act: 'ruled-release', ...desk, detail: { reason } }, unit);
  } else {
    await cancelDeal(deal, { act: 'ruled-refund', ...desk, reason }, unit);
  }
  await mailDealRuled(deal, { ruling, reason }, unit);
  return deal;
}
