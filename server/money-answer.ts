import { minorToAmount } from '#shared/money.ts';
import type { MoneyAnswer } from '#shared/schemas/common.ts';

/** A count of cents as money travels. */
export function moneyAnswer(minor: bigint): MoneyAnswer {
  return { currency: 'USD', amount: minorToAmount(minor) };
}
