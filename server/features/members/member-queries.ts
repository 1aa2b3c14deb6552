import type { Actor } from '#server/routing/define-route.ts';
import { Member } from '#server/models/member.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';

export async function findMember(id: string): Promise<Member | null> {
  return Member.findByPk(id, { include: [{ model: PayoutAccount, as: 'payoutAccount' }] });
}

export async function findMemberByEmail(email: string): Promise<Member | null> {
  return Member.findOne({ where: { email: email.trim().toLowerCase() } });
}

/** What the rest of the server knows of whoever is calling. */
export function actorOf(member: Member): Actor {
  return {
    id: member.id,
    role: member.role,
    displayName: member.displayName,
    email: member.email,
    timeZone: member.timeZone,
    region: member.region,
    suspendedAt: member.suspendedAt,
  };
}

/** Selling is open once the provider says that money can be sent to the member and on to the bank. */
export function canSell(member: Member): boolean {
  const account = member.payoutAccount;
  return (
    member.suspendedAt === null &&
    account !== undefined &&
    account !== null &&
    account.detailsSubmitted &&
    account.transfersActive &&
    account.payoutsEnabled
  );
}
