import { UniqueConstraintError } from 'sequelize';
import type { Role } from '#shared/roles.ts';
import { ConflictError, InvalidError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { openMemberAccounts } from '#server/features/ledger/open-accounts.ts';
import { Member } from '#server/models/member.ts';
import { isTimeZone } from './time-zones.ts';

export type NewMember = {
  email: string;
  passwordHash: string;
  displayName: string;
  region: string;
  timeZone: string;
  role: Role;
};

/**
 * Makes a member and the member's two ledger accounts, which are born together so that nobody ever locks a balance that is
 * not there. The password is hashed before the transaction opens.
 *
 * Throws `email-taken`, `invalid-input` for a time zone that does not exist.
 */
export async function createMember(input: NewMember, unit: Unit): Promise<Member> {
  if (!isTimeZone(input.timeZone)) {
    throw new InvalidError([
      { pointer: '/timeZone', code: 'unknown-time-zone', message: 'Choose a time zone from the list' },
    ]);
  }
  try {
    const member = await Member.create(
      { id: newId(), ...input, email: input.email.trim().toLowerCase() },
      { transaction: unit.tx },
    );
    await openMemberAccounts(member.id, unit);
    return member;
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new ConflictError('email-taken');
    throw error;
  }
}
