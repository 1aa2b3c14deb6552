import { Op } from 'sequelize';
import { Member } from '#server/models/member.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';

/** Mails that may be sent now, the oldest first, and those whose sender's lease has run out. */
export async function findDueMails(now: Date, limit: number): Promise<{ id: string }[]> {
  return OutboxMail.findAll({
    where: {
      [Op.or]: [
        { state: 'due', nextAt: { [Op.lte]: now } },
        { state: 'claimed', leaseUntil: { [Op.lte]: now } },
      ],
    },
    attributes: ['id'],
    order: [
      ['nextAt', 'ASC'],
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
