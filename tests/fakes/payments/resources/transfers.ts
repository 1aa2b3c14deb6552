import type { z } from 'zod';
import type Stripe from 'stripe';
import { balanceOf, moveBetween } from '../balances.ts';
import { endpoint, find, findAccount, pathId } from '../endpoint.ts';
import type { Call, Endpoint } from '../endpoint.ts';
import { refused } from '../errors.ts';
import { emit } from '../events.ts';
import { allOf, idOf, keep, mustFind, newId, now, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { amount, currency, listInput, mergeMetadata, metadata, text } from '../input.ts';
import type { ShapeOf } from '../input.ts';
import { paginate, wholeList } from '../paginate.ts';
import { buildTransferPayment } from './charge-builder.ts';

const createInput = {
  amount,
  currency,
  destination: text,
  description: text.optional(),
  metadata: metadata.optional(),
  source_transaction: text.optional(),
  transfer_group: text.optional(),
} satisfies ShapeOf<Stripe.TransferCreateParams>;
type Create = z.output<z.ZodObject<typeof createInput>>;

/** What a charge can still give to transfers that name it as their source. */
function restOf(fake: Fake, charge: Stripe.Charge): number {
  const used = allOf(fake, 'transfer')
    .filter((transfer) => transfer.source_transaction === charge.id)
    .reduce((sum, transfer) => sum + transfer.amount - transfer.amount_reversed, 0);
  return charge.amount - charge.amount_refunded - used;
}

/** When the money moves; refuses what the source or the balance cannot give. */
function fundingOf(call: Call<Create>): { availableOn: number; charge: Stripe.Charge | null } {
  const { fake, input } = call;
  const at = now(fake);
  if (input.source_transaction === undefined) {
    if (balanceOf(fake, platform).available < input.amount) {
      throw refused(
        'You have insufficient available funds in your account to create this transfer.',
        'balance_insufficient',
      );
    }
    return { availableOn: at, charge: null };
  }
  const charge = find(call, 'charge', input.source_transaction, 'source_transaction');
  if (charge.status !== 'succeeded') {
    throw refused(
      'The charge named as source_transaction has not succeeded.',
      'charge_not_transferable',
      'source_transaction',
    );
  }
  if (input.amount > restOf(fake, charge)) {
    throw refused(
      'Insufficient funds: the transfers of a source_transaction may not exceed the amount left on it.',
      'balance_insufficient',
      'amount',
    );
  }
  const source = mustFind(fake, 'balance_transaction', idOf(charge.balance_transaction) ?? '');
  return { availableOn: Math.max(at, source.available_on), charge };
}

function createTransfer(call: Call<Create>): Stripe.Transfer {
  const { fake, input } = call;
  const destination = findAccount(call, input.destination, 'destination');
  if (destination.capabilities?.transfers !== 'active') {
    throw refused(
      'Your destination account needs to have at least one of the following capabilities enabled: transfers',
      'insufficient_capabilities_for_transfer',
    );
  }
  const { availableOn, charge } = fundingOf(call);
  const id = newId('tr');
  const group = input.transfer_group ?? charge?.transfer_group ?? null;
  const transfer: Stripe.Transfer = {
    id,
    object: 'transfer',
    amount: input.amount,
    amount_reversed: 0,
    balance_transaction: null,
    created: now(fake),
    currency: input.currency,
    description: input.description ?? null,
    destination: destination.id,
    livemode: false,
    metadata: mergeMetadata({}, input.metadata),
    reversals: wholeList<Stripe.TransferReversal>([], `/v1/transfers/${id}/reversals`),
    reversed: false,
    source_transaction: charge?.id ?? null,
    source_type: 'card',
    transfer_group: group,
  };
  const payment = buildTransferPayment(fake, { ...transfer, transfer_group: group });
  keep(fake, call.owner, transfer);
  keep<Stripe.Charge>(fake, destination.id, payment);
  const common = { description: transfer.description };
  const moved = moveBetween(fake, {
    from: { ...common, owner: platform, type: 'transfer', category: 'transfer', source: id },
    to: { ...common, owner: destination.id, type: 'payment', category: 'charge', source: payment.id },
    amount: transfer.amount,
    currency: transfer.currency,
    availableOn,
  });
  transfer.balance_transaction = moved.out.id;
  payment.balance_transaction = moved.into.id;
  transfer.destination_payment = payment.id;
  emit(fake, platform, 'transfer.created', transfer, { request: call.request });
  return transfer;
}

export const transferEndpoints: Endpoint[] = [
  endpoint('POST', '/v1/transfers', createInput, createTransfer),
  endpoint('GET', '/v1/transfers/:id', {}, (call) => find(call, 'transfer', pathId(call))),
  endpoint(
    'GET',
    '/v1/transfers',
    { ...listInput, transfer_group: text.optional(), destination: text.optional() },
    (call) => {
      const { transfer_group: group, destination } = call.input;
      const transfers = allOf(call.fake, 'transfer', call.owner).filter(
        (transfer) =>
          (group === undefined || transfer.transfer_group === group) &&
          (destination === undefined || transfer.destination === destination),
      );
      return paginate(transfers, call.input, '/v1/transfers');
    },
  ),
  endpoint('POST', '/v1/transfers/:id', { metadata: metadata.optional() }, (call) => {
    const transfer = find(call, 'transfer', pathId(call));
    transfer.metadata = mergeMetadata(transfer.metadata, call.input.metadata);
    call.fake.store.touch();
    return transfer;
  }),
];
