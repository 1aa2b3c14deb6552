import { Op, type Transaction } from 'sequelize';
import { dec, plain } from '#shared/decimal.ts';
import type { CommissionRate } from '#shared/settlement/commission.ts';
import { FeeSchedule } from '#server/models/fee-schedule.ts';

export type CurrentFee = CommissionRate & { method: FeeSchedule['paymentMethod']; validFrom: Date };

const METHODS: readonly FeeSchedule['paymentMethod'][] = ['card', 'bank_debit'];

/** The rate of each payment method that is valid now; dated rows are only ever added. */
export async function currentFees(now: Date, tx: Transaction | null = null): Promise<CurrentFee[]> {
  const rows = await Promise.all(
    METHODS.map((paymentMethod) =>
      FeeSchedule.findOne({
        where: { paymentMethod, validFrom: { [Op.lte]: now } },
        order: [['validFrom', 'DESC']],
        transaction: tx,
      }),
    ),
  );
  return rows.flatMap((row) =>
    row === null
      ? []
      : [
          {
            method: row.paymentMethod,
            percent: plain(dec(row.percent)),
            minimumMinor: row.minimumMinor,
            validFrom: row.validFrom,
          },
        ],
  );
}
