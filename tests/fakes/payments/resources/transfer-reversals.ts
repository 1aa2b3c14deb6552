import type { z } from 'zod';
import type Stripe from 'stripe';
import { balanceOf, moveBetween } from '../balances.ts';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Call, Endpoint } from '../endpoint.ts';
import { refused, resourceMissing } from '../errors.ts';
import { emit } from '../events.ts';
import { idOf, keep, mustFind, newId, now, platform } from '../fake.ts';
import { amount, listInput, mergeMetadata, metadata, text } from '../input.ts';
import type { ShapeOf } from '../input.ts';
import { paginate } from '../paginate.ts';

const createInput = {
  amount: amount.optional(),
  description: text.optional(),
  metadata: metadata.optional(),
} satisfies ShapeOf<Stripe.TransferCreateReversalParams>;
type Create = z.output<z.ZodObject<typeof createInput>>;

function createReversal(call: Call<Create>): Stripe.TransferReversal {
  const { fake, input } = call;
  const transfer = find(call, 'transfer', pathId(call));
  const rest = transfer.amount - transfer.amount_reversed;
  if (rest === 0) {
    throw refused('Transfer is already fully reversed.', 'transfer_already_reversed');
  }
  const size = input.amount ?? rest;
  if (size > rest) {
    throw refused(
      `Reversal amount (${size}) is greater than the unreversed amount on the transfer (${rest}).`,
      'amount_too_large',
      'amount',
    );
  }
  const account = idOf(transfer.destination) ?? '';
  const held = balanceOf(fake, account);
  if (held.available + held.pending < size) {
    throw refused(
      'The destination account does not have enough balance to reverse this transfer.',
      'balance_insufficient',
    );
  }
  const payment = mustFind(fake, 'charge', idOf(transfer.destination_payment) ?? '');
  const paid = mustFind(fake, 'balance_transaction', idOf(payment.balance_transaction) ?? '');
  const reversal: Stripe.TransferReversal = {
    id: newId('trr'),
    object: 'transfer_reversal',
    amount: size,
    balance_transaction: null,
    created: now(fake),
    currency: transfer.currency,
    destination_payment_refund: null,
    metadata: mergeMetadata({}, input.metadata),
    source_refund: null,
    transfer: transfer.id,
  };
  keep(fake, call.owner, reversal);
  const description = input.description ?? null;
  const moved = moveBetween(fake, {
    from: { owner: account, type: 'payment_refund', category: 'refund', source: payment.id, description },
    to: {
      owner: platform,
      type: 'transfer_refund',
      category: 'transfer_reversal',
      source: reversal.id,
      description,
    },
    amount: size,
    currency: transfer.currency,
    availableOn: Math.max(now(fake), paid.available_on),
  });
  reversal.balance_transaction = moved.into.id;
  transfer.amount_reversed += size;
  transfer.reversed = transfer.amount_reversed === transfer.amount;
  transfer.reversals.data.unshift(reversal);
  payment.amount_refunded += size;
  payment.refunded = transfer.reversed;
  emit(fake, platform, 'transfer.reversed', transfer, { request: call.request });
  return reversal;
}

export const transferReversalEndpoints: Endpoint[] = [
  endpoint('POST', '/v1/transfers/:id/reversals', createInput, createReversal),
  endpoint('GET', '/v1/transfers/:id/reversals', { ...listInput }, (call) => {
    const transfer = find(call, 'transfer', pathId(call));
    return paginate(transfer.reversals.data, call.input, transfer.reversals.url);
  }),
  endpoint('GET', '/v1/transfers/:id/reversals/:reversal', {}, (call) => {
    const transfer = find(call, 'transfer', pathId(call));
    const reversal = find(call, 'transfer_reversal', pathId(call, 'reversal'));
    if (reversal.transfer !== transfer.id) throw resourceMissing('transfer reversal', reversal.id);
    return reversal;
  }),
];
