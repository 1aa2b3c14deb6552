import type Stripe from 'stripe';
import { cardFee, moveOutside } from '../balances.ts';
import { outside } from '../books.ts';
import { declineOf, disputingCard } from '../cards.ts';
import { emit } from '../events.ts';
import { idOf, keep, mustFind, now, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { buildCardCharge } from './charge-builder.ts';
import type { Card } from './charge-builder.ts';
import { openDispute } from './dispute-progress.ts';
import { createIntent } from './payment-intents.ts';

export type PayResult =
  | { outcome: 'paid' }
  | { outcome: 'closed'; status: string }
  | { outcome: 'declined'; code: string; declineCode: string | null; message: string };

function settle(
  fake: Fake,
  session: Stripe.Checkout.Session,
  intent: Stripe.PaymentIntent,
  card: Card,
): void {
  const charge = keep<Stripe.Charge>(fake, platform, buildCardCharge(fake, { intent, card, decline: null }));
  const entry = moveOutside(fake, {
    owner: platform,
    counterpart: outside.cards,
    amount: charge.amount,
    fee: cardFee(charge.amount),
    currency: charge.currency,
    type: 'charge',
    category: 'charge',
    source: charge.id,
    description: charge.description,
    availableOn: now(fake) + fake.state.settings.settlementDelaySeconds,
  });
  charge.balance_transaction = entry.id;
  intent.status = 'succeeded';
  intent.amount_received = intent.amount;
  intent.latest_charge = charge.id;
  intent.last_payment_error = null;
  intent.payment_method = charge.payment_method;
  session.status = 'complete';
  session.payment_status = 'paid';
  session.url = null;
  session.customer_details = {
    address: null,
    business_name: null,
    email: session.customer_email,
    individual_name: null,
    name: card.name,
    phone: null,
    tax_exempt: 'none',
    tax_ids: [],
  };
  emit(fake, platform, 'charge.succeeded', charge);
  emit(fake, platform, 'payment_intent.succeeded', intent);
  emit(fake, platform, 'checkout.session.completed', session);
}

function decline(
  fake: Fake,
  intent: Stripe.PaymentIntent,
  card: Card,
  reason: { code: string; declineCode: string | null; message: string },
): void {
  const charge = keep<Stripe.Charge>(
    fake,
    platform,
    buildCardCharge(fake, { intent, card, decline: reason }),
  );
  intent.latest_charge = charge.id;
  intent.last_payment_error = {
    type: 'card_error',
    code: reason.code,
    message: reason.message,
    charge: charge.id,
    ...(reason.declineCode !== null && { decline_code: reason.declineCode }),
  };
  emit(fake, platform, 'charge.failed', charge);
  emit(fake, platform, 'payment_intent.payment_failed', intent);
}

/** One attempt to pay a session by card. A session that is no longer open changes nothing. */
export function paySession(fake: Fake, session: Stripe.Checkout.Session, card: Card): PayResult {
  const isOver = (fake.state.sessionDetails[session.id]?.expiresAt ?? 0) <= now(fake);
  if (session.status !== 'open' || isOver) return { outcome: 'closed', status: session.status ?? 'expired' };
  const known = idOf(session.payment_intent);
  const intent = known ? mustFind(fake, 'payment_intent', known) : createIntent(fake, session);
  session.payment_intent = intent.id;
  const reason = declineOf(card.number);
  if (reason) {
    decline(fake, intent, card, reason);
    fake.store.touch();
    return { outcome: 'declined', ...reason };
  }
  settle(fake, session, intent, card);
  if (card.number === disputingCard) {
    openDispute(fake, mustFind(fake, 'charge', idOf(intent.latest_charge) ?? ''), 'fraudulent');
  }
  fake.store.touch();
  return { outcome: 'paid' };
}

/** A card for callers without a form. */
export function testCard(number: string): Card {
  return { number, expiryMonth: 12, expiryYear: 2040, name: null };
}
