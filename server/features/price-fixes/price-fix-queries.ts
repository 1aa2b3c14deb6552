import { Op, type Transaction } from 'sequelize';
import { PriceFix } from '#server/models/price-fix.ts';

/** The fix that holds a lot, past its time or not: until it has ended in the books nobody else gets the lot. */
export async function openFixOf(lotId: string, tx?: Transaction): Promise<PriceFix | null> {
  return PriceFix.findOne({ where: { openLotId: lotId }, ...(tx === undefined ? {} : { transaction: tx }) });
}

/** A member's own fixes that still stand open though their time is over. */
export async function pastFixesOf(memberId: string, now: Date): Promise<PriceFix[]> {
  return PriceFix.findAll({ where: { openMemberId: memberId, fixedUntil: { [Op.lte]: now } } });
}

/** Open fixes whose time has come, oldest first, by the index on it. */
export async function fixesPast(now: Date, limit: number): Promise<PriceFix[]> {
  return PriceFix.findAll({
    where: { state: 'open', fixedUntil: { [Op.lte]: now } },
    order: [['fixedUntil', 'ASC']],
    limit,
  });
}
