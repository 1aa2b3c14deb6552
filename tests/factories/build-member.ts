import { randomBytes } from 'node:crypto';
import type { Role } from '#shared/roles.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { createMember } from '#server/features/members/create-member.ts';
import { actorOf } from '#server/features/members/member-queries.ts';
import { hashPassword } from '#server/features/members/passwords.ts';
import { Member } from '#server/models/member.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';
import type { Actor } from '#server/routing/define-route.ts';

export type BuiltMember = { id: string; email: string; password: string; displayName: string; actor: Actor };

type Wishes = {
  role?: Role;
  canSell?: boolean;
  region?: string;
  timeZone?: string;
  providerAccountId?: string;
};

/** One password for all, hashed once: the hash is deliberately slow. */
const PASSWORD = 'a-long-enough-password';
let passwordHash: Promise<string> | null = null;

/** A member of its own for the calling test. `canSell` stands for finished payout onboarding. */
export async function buildMember(wishes: Wishes = {}): Promise<BuiltMember> {
  const mark = randomBytes(4).toString('hex');
  passwordHash ??= hashPassword(PASSWORD);
  const hash = await passwordHash;
  const member = await withTransaction({}, (unit) =>
    createMember(
      {
        email: `member-${mark}@scruple.example`,
        passwordHash: hash,
        displayName: `Member ${mark}`,
        region: wishes.region ?? 'Harrow Vale',
        timeZone: wishes.timeZone ?? 'UTC',
        role: wishes.role ?? 'member',
      },
      unit,
    ),
  );
  if (wishes.canSell === true) {
    await PayoutAccount.create({
      id: newId(),
      memberId: member.id,
      providerAccountId: wishes.providerAccountId ?? `acct_test${mark}`,
      detailsSubmitted: true,
      transfersActive: true,
      payoutsEnabled: true,
      requirements: [],
    });
  }
  const fresh = await Member.findByPk(member.id, { rejectOnEmpty: true });
  return {
    id: fresh.id,
    email: fresh.email,
    password: PASSWORD,
    displayName: fresh.displayName,
    actor: actorOf(fresh),
  };
}
