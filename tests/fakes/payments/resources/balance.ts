import type Stripe from 'stripe';
import { balanceOf } from '../balances.ts';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { allOf } from '../fake.ts';
import { listInput, text } from '../input.ts';
import { paginate } from '../paginate.ts';

function sums(amount: number) {
  return [{ amount, currency: 'usd', source_types: { card: amount } }];
}

export const balanceEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/balance', {}, (call) => {
    const { available, pending } = balanceOf(call.fake, call.owner);
    return {
      object: 'balance',
      available: sums(available),
      livemode: false,
      pending: sums(pending),
    } satisfies Stripe.Balance;
  }),
  endpoint('GET', '/v1/balance_transactions/:id', {}, (call) =>
    find(call, 'balance_transaction', pathId(call)),
  ),
  endpoint(
    'GET',
    '/v1/balance_transactions',
    { ...listInput, type: text.optional(), source: text.optional(), payout: text.optional() },
    (call) => {
      const { type, source, payout } = call.input;
      const transactions = allOf(call.fake, 'balance_transaction', call.owner).filter(
        (transaction) =>
          (type === undefined || transaction.type === type) &&
          (source === undefined || transaction.source === source) &&
          (payout === undefined || transaction.source === payout),
      );
      return paginate(transactions, call.input, '/v1/balance_transactions');
    },
  ),
];
