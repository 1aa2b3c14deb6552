import { isDeskStaff } from '#shared/roles.ts';
import type { Member } from '#server/models/member.ts';
import type { Actor } from '#server/routing/define-route.ts';

type Who = Pick<Actor, 'id' | 'role'>;

/** The desk may act on members and laboratories, an admin also on the desk; nobody on an admin, nobody on himself. */
export function mayActOnMember(actor: Who, member: Pick<Member, 'id' | 'role'>): boolean {
  if (!isDeskStaff(actor.role) || member.id === actor.id || member.role === 'admin') return false;
  return actor.role === 'admin' || !isDeskStaff(member.role);
}

type Subject = Pick<Member, 'id' | 'role' | 'suspendedAt'>;

export function canSuspend(actor: Who, member: Subject): boolean {
  return member.suspendedAt === null && mayActOnMember(actor, member);
}

export function canReinstate(actor: Who, member: Subject): boolean {
  return member.suspendedAt !== null && mayActOnMember(actor, member);
}
