import { newId, now } from './fake.ts';
import type { Fake } from './fake.ts';
import type { Journal } from './state.ts';

/** Where money comes from and goes to outside the balances that the API shows. */
export const outside = { cards: 'outside:cards', banks: 'outside:banks', fees: 'provider:fees' } as const;

interface Movement {
  from: string;
  to: string;
  amount: number;
  currency: string;
  memo: string;
  source: string;
}

/** Books one movement as a journal of two legs that sum to zero. */
export function bookMovement(fake: Fake, movement: Movement): Journal {
  const { from, to, amount, currency, memo, source } = movement;
  if (!Number.isSafeInteger(amount) || amount <= 0) throw new Error(`Cannot book ${amount} for ${memo}`);
  const journal: Journal = {
    id: newId('jrn'),
    at: now(fake),
    memo,
    source,
    currency,
    legs: [
      { account: from, amount: -amount },
      { account: to, amount },
    ],
  };
  fake.state.journals.push(journal);
  fake.store.touch();
  return journal;
}

/** Balance of every account in the books; the sum over all of them is zero. */
export function bookBalances(fake: Fake): Record<string, number> {
  const balances: Record<string, number> = {};
  for (const journal of fake.state.journals) {
    for (const leg of journal.legs) balances[leg.account] = (balances[leg.account] ?? 0) + leg.amount;
  }
  return balances;
}
