import { z } from 'zod';
import type Stripe from 'stripe';
import { balanceOf, moveOutside } from '../balances.ts';
import { payingBank } from '../banks.ts';
import { outside } from '../books.ts';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Call, Endpoint } from '../endpoint.ts';
import { refused } from '../errors.ts';
import { emit } from '../events.ts';
import { allOf, keep, lookUp, newId, now } from '../fake.ts';
import { amount, currency, listInput, mergeMetadata, metadata, text } from '../input.ts';
import type { ShapeOf } from '../input.ts';
import { paginate } from '../paginate.ts';

const createInput = {
  amount,
  currency,
  description: text.optional(),
  destination: text.optional(),
  metadata: metadata.optional(),
  method: z.enum(['standard']).optional(),
  source_type: z.enum(['card']).optional(),
  statement_descriptor: z.string().min(1).max(22).optional(),
} satisfies ShapeOf<Stripe.PayoutCreateParams>;
type Create = z.output<z.ZodObject<typeof createInput>>;

function bankOf(call: Call<Create>): { id: string; number: string } {
  const account = lookUp(call.fake, 'account', call.owner);
  if (!account) return { id: 'ba_platform', number: payingBank };
  const bank = account.external_accounts?.data[0];
  if (!bank) {
    throw refused(
      "Sorry, you don't have any external accounts in that currency (usd).",
      'no_external_account_in_currency',
    );
  }
  if (!account.payouts_enabled) {
    throw refused(
      'Payouts are not enabled for this account: its bank account must be replaced or its details completed.',
      'payouts_not_allowed',
    );
  }
  const asked = call.input.destination;
  if (asked !== undefined && asked !== bank.id) {
    throw refused(`No such external account: '${asked}'`, 'resource_missing', 'destination');
  }
  return { id: bank.id, number: call.fake.state.bankNumbers[bank.id] ?? payingBank };
}

function createPayout(call: Call<Create>): Stripe.Payout {
  const { fake, input, owner } = call;
  const bank = bankOf(call);
  if (balanceOf(fake, owner).available < input.amount) {
    throw refused(
      'You have insufficient funds in your account for this payout.',
      'balance_insufficient',
      'amount',
    );
  }
  const at = now(fake);
  const settlesAt = at + fake.state.settings.payoutDelaySeconds;
  const payout: Stripe.Payout = {
    id: newId('po'),
    object: 'payout',
    amount: input.amount,
    application_fee: null,
    application_fee_amount: null,
    arrival_date: settlesAt,
    automatic: false,
    balance_transaction: null,
    created: at,
    currency: input.currency,
    description: input.description ?? null,
    destination: bank.id,
    failure_balance_transaction: null,
    failure_code: null,
    failure_message: null,
    livemode: false,
    metadata: mergeMetadata({}, input.metadata),
    method: 'standard',
    original_payout: null,
    payout_method: null,
    reconciliation_status: 'not_applicable',
    reversed_by: null,
    source_type: 'card',
    statement_descriptor: input.statement_descriptor ?? null,
    status: 'pending',
    trace_id: null,
    type: 'bank_account',
  };
  keep(fake, owner, payout);
  fake.state.payoutPlans[payout.id] = { inTransitAt: at, settlesAt, bankNumber: bank.number };
  const entry = moveOutside(fake, {
    owner,
    counterpart: outside.banks,
    amount: -payout.amount,
    currency: payout.currency,
    type: 'payout',
    category: 'payout',
    source: payout.id,
    description: 'PAYOUT',
    availableOn: at,
  });
  payout.balance_transaction = entry.id;
  emit(fake, owner, 'payout.created', payout, { request: call.request });
  return payout;
}

export const payoutEndpoints: Endpoint[] = [
  endpoint('POST', '/v1/payouts', createInput, createPayout),
  endpoint('GET', '/v1/payouts/:id', {}, (call) => find(call, 'payout', pathId(call))),
  endpoint(
    'GET',
    '/v1/payouts',
    { ...listInput, status: text.optional(), destination: text.optional() },
    (call) => {
      const { status, destination } = call.input;
      const payouts = allOf(call.fake, 'payout', call.owner).filter(
        (payout) =>
          (status === undefined || payout.status === status) &&
          (destination === undefined || payout.destination === destination),
      );
      return paginate(payouts, call.input, '/v1/payouts');
    },
  ),
];
