import type { Role } from '#shared/roles.ts';
import { ConflictError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { Member } from '#server/models/member.ts';
import type { Actor } from '#server/routing/define-route.ts';

async function refuseWithoutAdmin(member: Member, unit: Unit): Promise<void> {
  const admins = await Member.findAll({
    where: { role: 'admin' },
    attributes: ['id'],
    transaction: unit.tx,
    lock: unit.tx.LOCK.UPDATE,
  });
  if (admins.every((admin) => admin.id === member.id))
    throw new ConflictError('illegal-transition', 'The house needs another admin first.');
}

/**
 * Gives a member a role. It holds from the member's next request on. The last admin keeps the role.
 *
 * Caller holds the member. Throws `not-found`, `illegal-transition`. Nothing is written when the role is held already.
 */
export async function setRole(
  { memberId, role }: { memberId: string; role: Role },
  unit: Unit,
  actor: Pick<Actor, 'id' | 'role'> | null,
): Promise<Member> {
  const member = await Member.findByPk(memberId, { transaction: unit.tx });
  if (member === null) throw new NotFoundError();
  if (member.role === role) return member;
  if (member.role === 'admin') await refuseWithoutAdmin(member, unit);
  const detail = { from: member.role, to: role };
  await member.update({ role }, { transaction: unit.tx });
  await recordAudit({ actor, act: 'set-role', subjectKind: 'member', subjectId: memberId, detail }, unit);
  return member;
}
