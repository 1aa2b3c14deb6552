import { Op } from 'sequelize';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import { Payout } from '#server/models/payout.ts';
import { Refund } from '#server/models/refund.ts';

/** Deals whose time to pay is over, the longest first; a frozen one has no clock. */
export async function unpaidDealsPast(now: Date, limit = 200): Promise<Deal[]> {
  return Deal.findAll({
    where: { state: 'agreed', fundBy: { [Op.lte]: now }, frozenAt: null },
    order: [['fundBy', 'ASC']],
    limit,
  });
}

/** Sessions that no message has told us the end of. */
export async function openPaymentsBefore(moment: Date, limit = 200): Promise<Payment[]> {
  return Payment.findAll({
    where: { state: 'open', updatedAt: { [Op.lte]: moment } },
    order: [['updatedAt', 'ASC']],
    limit,
  });
}

/** Payouts that no message has told us the end of. */
export async function sentPayoutsBefore(moment: Date, limit = 200): Promise<Payout[]> {
  return Payout.findAll({
    where: { state: 'sent', updatedAt: { [Op.lte]: moment } },
    order: [['updatedAt', 'ASC']],
    limit,
  });
}

export async function failedPayoutsBefore(moment: Date, limit = 200): Promise<Payout[]> {
  return Payout.findAll({
    where: { state: 'failed', updatedAt: { [Op.lte]: moment } },
    order: [['updatedAt', 'ASC']],
    limit,
  });
}

export async function sentRefundsBefore(moment: Date, limit = 200): Promise<Refund[]> {
  return Refund.findAll({
    where: { state: 'sent', updatedAt: { [Op.lte]: moment } },
    order: [['updatedAt', 'ASC']],
    limit,
  });
}
