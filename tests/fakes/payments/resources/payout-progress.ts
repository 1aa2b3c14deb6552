import type Stripe from 'stripe';
import { moveOutside } from '../balances.ts';
import { payoutFailureOf } from '../banks.ts';
import type { PayoutFailure } from '../banks.ts';
import { outside } from '../books.ts';
import { emit } from '../events.ts';
import { allOf, idOf, lookUp, now, ownerOf, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { breakBank } from './account-state.ts';

export function markPaid(fake: Fake, payout: Stripe.Payout): boolean {
  if (payout.status !== 'pending' && payout.status !== 'in_transit') return false;
  payout.status = 'paid';
  payout.arrival_date = now(fake);
  emit(fake, ownerOf(fake, payout.id) ?? platform, 'payout.paid', payout);
  fake.store.touch();
  return true;
}

/** A payout may fail on its way and also some days after it was paid; the money comes back either way. */
export function markFailed(fake: Fake, payout: Stripe.Payout, failure: PayoutFailure): boolean {
  if (payout.status === 'failed' || payout.status === 'canceled') return false;
  const owner = ownerOf(fake, payout.id) ?? platform;
  const entry = moveOutside(fake, {
    owner,
    counterpart: outside.banks,
    amount: payout.amount,
    currency: payout.currency,
    type: 'payout_failure',
    category: 'payout_reversal',
    source: payout.id,
    description: 'PAYOUT FAILURE',
    availableOn: now(fake),
  });
  payout.status = 'failed';
  payout.failure_code = failure.code;
  payout.failure_message = failure.message;
  payout.failure_balance_transaction = entry.id;
  emit(fake, owner, 'payout.failed', payout);
  const account = lookUp(fake, 'account', owner);
  if (failure.breaksBank && account) breakBank(fake, account, idOf(payout.destination) ?? '');
  fake.store.touch();
  return true;
}

/** Moves payouts on by the fake's clock; true when something changed. */
export function advancePayouts(fake: Fake): boolean {
  const at = now(fake);
  let changed = false;
  for (const payout of allOf(fake, 'payout').reverse()) {
    const plan = fake.state.payoutPlans[payout.id];
    if (!plan) continue;
    if (payout.status === 'pending' && plan.inTransitAt <= at) {
      payout.status = 'in_transit';
      emit(fake, ownerOf(fake, payout.id) ?? platform, 'payout.updated', payout, {
        previous: { status: 'pending' },
      });
      changed = true;
    }
    if (payout.status !== 'in_transit' || plan.settlesAt > at) continue;
    const failure = payoutFailureOf(plan.bankNumber);
    changed = (failure ? markFailed(fake, payout, failure) : markPaid(fake, payout)) || changed;
  }
  if (changed) fake.store.touch();
  return changed;
}
