import type { ProfileRequest } from '#shared/schemas/session.ts';
import { InvalidError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Member } from '#server/models/member.ts';
import { isTimeZone } from './time-zones.ts';

/**
 * Changes what a member may change about himself. Lots keep the region they were submitted with.
 *
 * Locks the member. Throws `not-found`, `invalid-input`.
 */
export async function updateProfile(memberId: string, input: ProfileRequest, unit: Unit): Promise<Member> {
  if (!isTimeZone(input.timeZone)) {
    throw new InvalidError([
      { pointer: '/timeZone', code: 'unknown-time-zone', message: 'Choose a time zone from the list' },
    ]);
  }
  const member = await Member.findByPk(memberId, { transaction: unit.tx });
  if (member === null) throw new NotFoundError();
  await member.update(input, { transaction: unit.tx });
  return member;
}
