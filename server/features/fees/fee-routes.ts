import { minorToAmount } from '#shared/money.ts';
import { feeScheduleAnswer } from '#shared/schemas/lots.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { currentFees } from './fee-queries.ts';

export const feeRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/fee-schedule',
    summary: 'The commission of each payment method that is valid now',
    access: 'public',
    limit: 'read',
    answer: feeScheduleAnswer,
    handle: async ({ res }) => {
      const fees = await currentFees(await databaseNow());
      res.json({
        rates: fees.map((fee) => ({
          method: fee.method,
          percent: fee.percent,
          minimum: { currency: 'USD', amount: minorToAmount(fee.minimumMinor) },
          validFrom: fee.validFrom.toISOString(),
        })),
      });
    },
  }),
];
