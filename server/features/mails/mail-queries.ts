import { literal, Op } from 'sequelize';
import { Member } from '#server/models/member.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';

/** Behind a mail that waits for its next try there is nothing to do; otherwise a hundred of them would fill the batch. */
const NOT_BEHIND = `NOT EXISTS (
  SELECT 1 FROM outbox_mails AS older
  WHERE older.deal_id = OutboxMail.deal_id AND older.member_id = OutboxMail.member_id
    AND older.created_at < OutboxMail.created_at
    AND ((older.state = 'due' AND older.next_at > :now) OR (older.state = 'claimed' AND older.lease_until > :now))
)`;

/** Mails that may be sent now, the oldest first, and those whose sender's lease has run out. */
export async function findDueMails(now: Date, limit: number): Promise<{ id: string }[]> {
  return OutboxMail.findAll({
    where: {
      [Op.and]: literal(NOT_BEHIND),
      [Op.or]: [
        { state: 'due', nextAt: { [Op.lte]: now } },
        { state: 'claimed', leaseUntil: { [Op.lte]: now } },
      ],
    },
    attributes: ['id'],
    replacements: { now },
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ],
    limit,
  });
}

/** Mails that were given up, for the admin. */
export async function findDeadMails(limit = 100): Promise<OutboxMail[]> {
  return OutboxMail.findAll({ where: { state: 'dead' }, order: [['updatedAt', 'DESC']], limit });
}

export async function countDeadMails(): Promise<number> {
  return OutboxMail.count({ where: { state: 'dead' } });
}

/** The names of whom the mails are for, by account. */
export async function namesOfReaders(mails: readonly OutboxMail[]): Promise<Map<string, string>> {
  const ids = mails.flatMap(({ memberId }) => (memberId === null ? [] : [memberId]));
  const members = await Member.findAll({
    where: { id: [...new Set(ids)] },
    attributes: ['id', 'displayName'],
  });
  return new Map(members.map(({ id, displayName }) => [id, displayName]));
}
