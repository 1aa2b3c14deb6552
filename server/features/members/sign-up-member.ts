import type { Unit } from '#server/database/transaction.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import type { Member } from '#server/models/member.ts';
import { createMember, type NewMember } from './create-member.ts';

/**
 * Somebody opens an account of his own: a member, never staff, with a mail that says what to do first.
 *
 * Throws `email-taken`, `invalid-input` as `createMember`.
 */
export async function signUpMember(input: Omit<NewMember, 'role'>, unit: Unit): Promise<Member> {
  const member = await createMember({ ...input, role: 'member' }, unit);
  await enqueueMail(
    {
      mail: 'welcome',
      memberId: member.id,
      uniqueKey: `welcome:${member.id}`,
      input: { displayName: member.displayName },
    },
    unit,
  );
  return member;
}
