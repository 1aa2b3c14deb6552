import { isDeskStaff } from '#shared/roles.ts';
import { weightUnitSchema, type WeightUnit } from '#shared/schemas/common.ts';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import type { Member } from '#server/models/member.ts';
import { canSell } from './member-queries.ts';

function payoutState(member: Member): MemberAnswer['payouts']['state'] {
  const account = member.payoutAccount;
  if (account === undefined || account === null || account.providerAccountId === null) return 'none';
  return account.transfersActive && account.payoutsEnabled ? 'ready' : 'started';
}

function requirementsOf(member: Member): string[] {
  const requirements: unknown = member.payoutAccount?.requirements;
  return Array.isArray(requirements)
    ? requirements.filter((item): item is string => typeof item === 'string')
    : [];
}

/** A member as the member himself sees it. */
export function presentMember(member: Member): MemberAnswer {
  return {
    id: member.id,
    email: member.email,
    displayName: member.displayName,
    role: member.role,
    region: member.region,
    weightUnit: weightUnitSchema.parse(member.weightUnit) satisfies WeightUnit,
    timeZone: member.timeZone,
    suspendedAt: member.suspendedAt?.toISOString() ?? null,
    suspensionReason: member.suspensionReason,
    payouts: { state: payoutState(member), requirements: requirementsOf(member) },
    can: { sell: canSell(member), useDesk: isDeskStaff(member.role) },
  };
}
