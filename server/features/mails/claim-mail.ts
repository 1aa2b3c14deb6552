import { Op } from 'sequelize';
import { isMailName, mailDefinition } from '#server/emails/mails.ts';
import { Deal } from '#server/models/deal.ts';
import type { Unit } from '#server/database/transaction.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';

const LEASE_SECONDS = 120;

/** An older mail of the same deal to the same reader goes first, unless it was given up: what happened first is read first. */
async function isBehindAnother({ dealId, memberId, createdAt }: OutboxMail, unit: Unit): Promise<boolean> {
  if (dealId === null) return false;
  const where = { dealId, memberId, state: ['due', 'claimed'], createdAt: { [Op.lt]: createdAt } };
  return (await OutboxMail.count({ where, transaction: unit.tx })) > 0;
}

/** It asks for something by a day, and the deal has moved past it: read now, it would only mislead. */
async function isSuperseded({ mail, dealId }: OutboxMail, unit: Unit): Promise<boolean> {
  if (dealId === null || !isMailName(mail)) return false;
  const { appliesWhile } = mailDefinition(mail);
  if (appliesWhile === undefined) return false;
  const deal = await Deal.findByPk(dealId, { attributes: ['state'], transaction: unit.tx });
  return deal !== null && !appliesWhile.includes(deal.state);
}

/**
 * Takes a mail for sending, committed before anything is sent: the token tells this sender from one whose lease ran out.
 * Answers null when another has it, it is done, or
 * an older one of its deal comes first; a mail that its deal has overtaken is dropped here. Locks the row.
 */
export async function claimMail(id: string, unit: Unit): Promise<OutboxMail | null> {
  const mail = await OutboxMail.findByPk(id, { lock: unit.tx.LOCK.UPDATE, transaction: unit.tx });
  if (mail === null) return null;
  const isFree =
    (mail.state === 'due' && mail.nextAt <= unit.now) ||
    (mail.state === 'claimed' && mail.leaseUntil !== null && mail.leaseUntil <= unit.now);
  if (!isFree || (await isBehindAnother(mail, unit))) return null;
  if (await isSuperseded(mail, unit)) {
    await mail.update({ state: 'superseded', leaseUntil: null }, { transaction: unit.tx });
    return null;
  }
  return mail.update(
    {
      state: 'claimed',
      leaseToken: mail.leaseToken + 1,
      leaseUntil: new Date(unit.now.getTime() + LEASE_SECONDS * 1000),
      tries: mail.tries + 1,
    },
    { transaction: unit.tx },
  );
}
