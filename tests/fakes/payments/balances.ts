import type Stripe from 'stripe';
import { bookBalances, bookMovement, outside } from './books.ts';
import { allOf, keep, newId, now, platform } from './fake.ts';
import type { Fake } from './fake.ts';

interface Entry {
  owner: string;
  /** Signed change of the owner's balance before the fee. */
  amount: number;
  fee?: number;
  currency: string;
  type: Stripe.BalanceTransaction.Type;
  category: string;
  source: string;
  description: string | null;
  availableOn: number;
}

/** What a card payment costs the platform: 2.9 % and 30 minor units, half a unit rounded up. */
export function cardFee(amount: number): number {
  return Math.floor((amount * 29 + 500) / 1000) + 30;
}

/** Writes the balance transaction that the API shows. The books are written beside it, by `move`. */
function writeEntry(fake: Fake, entry: Entry): Stripe.BalanceTransaction {
  const fee = entry.fee ?? 0;
  const transaction = {
    id: newId('txn'),
    object: 'balance_transaction',
    amount: entry.amount,
    available_on: entry.availableOn,
    balance_type: 'payments',
    created: now(fake),
    currency: entry.currency,
    description: entry.description,
    exchange_rate: null,
    fee,
    fee_details:
      fee === 0
        ? []
        : [
            {
              amount: fee,
              application: null,
              currency: entry.currency,
              description: 'Processing fee',
              type: 'stripe_fee',
            },
          ],
    net: entry.amount - fee,
    reporting_category: entry.category,
    source: entry.source,
    status: entry.availableOn <= now(fake) ? 'available' : 'pending',
    type: entry.type,
  } satisfies Stripe.BalanceTransaction;
  return keep(fake, entry.owner, transaction);
}

/** Money between an owner's balance and the world outside, with the provider's fee. */
export function moveOutside(fake: Fake, entry: Entry & { counterpart: string }): Stripe.BalanceTransaction {
  const [from, to] = entry.amount > 0 ? [entry.counterpart, entry.owner] : [entry.owner, entry.counterpart];
  const size = Math.abs(entry.amount);
  bookMovement(fake, {
    from,
    to,
    amount: size,
    currency: entry.currency,
    memo: entry.type,
    source: entry.source,
  });
  if (entry.fee !== undefined && entry.fee > 0) {
    bookMovement(fake, {
      from: entry.owner,
      to: outside.fees,
      amount: entry.fee,
      currency: entry.currency,
      memo: 'fee',
      source: entry.source,
    });
  }
  return writeEntry(fake, entry);
}

/** Money between two balances: one journal, a balance transaction on each side. */
export function moveBetween(
  fake: Fake,
  movement: {
    from: Omit<Entry, 'amount' | 'currency' | 'availableOn'>;
    to: Omit<Entry, 'amount' | 'currency' | 'availableOn'>;
    amount: number;
    currency: string;
    availableOn: number;
  },
): { out: Stripe.BalanceTransaction; into: Stripe.BalanceTransaction } {
  const { from, to, amount, currency, availableOn } = movement;
  bookMovement(fake, {
    from: from.owner,
    to: to.owner,
    amount,
    currency,
    memo: from.type,
    source: from.source,
  });
  return {
    out: writeEntry(fake, { ...from, amount: -amount, currency, availableOn }),
    into: writeEntry(fake, { ...to, amount, currency, availableOn }),
  };
}

export function balanceOf(fake: Fake, owner: string): { available: number; pending: number } {
  const at = now(fake);
  let available = 0;
  let pending = 0;
  for (const transaction of allOf(fake, 'balance_transaction', owner)) {
    if (transaction.available_on <= at) available += transaction.net;
    else pending += transaction.net;
  }
  return { available, pending };
}

/** Turns what has become available; true when something changed. */
export function settleDue(fake: Fake): boolean {
  const at = now(fake);
  let changed = false;
  for (const transaction of allOf(fake, 'balance_transaction')) {
    if (transaction.status !== 'pending' || transaction.available_on > at) continue;
    transaction.status = 'available';
    changed = true;
  }
  return changed;
}

/** The books with a proof that they say the same as the balance transactions. */
export function booksReport(fake: Fake) {
  const balances = bookBalances(fake);
  const owners = [platform, ...allOf(fake, 'account').map((account) => account.id)];
  const differences = owners
    .map((owner) => {
      const { available, pending } = balanceOf(fake, owner);
      return { owner, books: balances[owner] ?? 0, transactions: available + pending };
    })
    .filter((row) => row.books !== row.transactions);
  const sum = Object.values(balances).reduce((total, value) => total + value, 0);
  return { balances, sum, differences, journals: fake.state.journals };
}
