import { ConflictError, ForbiddenError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { pauseLotsOf } from '#server/features/lots/pause-lots-of.ts';
import { Member } from '#server/models/member.ts';
import { SessionRow } from '#server/models/session-row.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { mayActOnMember } from './member-policy.ts';

async function findSubject(memberId: string, unit: Unit, actor: Actor): Promise<Member> {
  const member = await Member.findByPk(memberId, { transaction: unit.tx });
  if (member === null) throw new NotFoundError();
  if (!mayActOnMember(actor, member))
    throw new ForbiddenError('forbidden', 'Admins and your own account cannot be suspended here.');
  return member;
}

/**
 * Suspends a member: all sessions end at once, and from then on the account can look but not act. Deals that run are left
 * to their deadlines and to the desk; what he has on offer is paused.
 *
 * Caller holds the member; the member's open lots are locked here. Throws `not-found`, `forbidden`, `illegal-transition` when suspended already.
 */
export async function suspendMember(
  { memberId, reason }: { memberId: string; reason: string },
  unit: Unit,
  actor: Actor,
): Promise<Member> {
  const member = await findSubject(memberId, unit, actor);
  if (member.suspendedAt !== null)
    throw new ConflictError('illegal-transition', 'This account is suspended already.');
  await member.update({ suspendedAt: unit.now, suspensionReason: reason }, { transaction: unit.tx });
  const sessionsEnded = await SessionRow.destroy({ where: { memberId }, transaction: unit.tx });
  const lotsPaused = await pauseLotsOf({ memberId }, unit, actor);
  await recordAudit(
    {
      actor,
      act: 'suspend-member',
      subjectKind: 'member',
      subjectId: memberId,
      detail: { reason, sessionsEnded, lotsPaused },
    },
    unit,
  );
  return member;
}

/**
 * Lifts a suspension; the reason stays in the audit trail. Lots that were paused stay so until their seller reopens them.
 *
 * Caller holds the member. Throws `not-found`, `forbidden`, `illegal-transition` when not suspended.
 */
export async function reinstateMember(memberId: string, unit: Unit, actor: Actor): Promise<Member> {
  const member = await findSubject(memberId, unit, actor);
  if (member.suspendedAt === null)
    throw new ConflictError('illegal-transition', 'This account is not suspended.');
  const { suspendedAt, suspensionReason } = member;
  await member.update({ suspendedAt: null, suspensionReason: null }, { transaction: unit.tx });
  const detail = { suspendedAt: suspendedAt.toISOString(), reason: suspensionReason };
  await recordAudit(
    { actor, act: 'reinstate-member', subjectKind: 'member', subjectId: memberId, detail },
    unit,
  );
  return member;
}
