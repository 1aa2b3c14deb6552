import Stripe from 'stripe';
import { keep, newId, now, platform } from './fake.ts';
import type { Fake } from './fake.ts';
import type { Kinds, Kind } from './state.ts';

export interface RequestNote {
  id: string | null;
  idempotency_key: string | null;
}

/** An event happens: it is kept, and queued for the webhook when one is configured. */
export function emit(
  fake: Fake,
  owner: string,
  type: Stripe.Event.Type,
  object: Kinds[Kind],
  more: { request?: RequestNote; previous?: Record<string, unknown> } = {},
): Stripe.Event {
  const hasWebhook = fake.options.webhookUrl !== '';
  const base = {
    id: newId('evt'),
    object: 'event',
    ...(owner !== platform && { account: owner }),
    api_version: Stripe.API_VERSION,
    created: now(fake),
    data: {
      object: structuredClone(object) as Stripe.Event.Data.Object,
      ...(more.previous && { previous_attributes: more.previous }),
    },
    livemode: false,
    pending_webhooks: hasWebhook ? 1 : 0,
    request: more.request ?? { id: null, idempotency_key: null },
    type,
  };
  const event = keep(fake, owner, base as unknown as Stripe.Event);
  if (hasWebhook) queueDelivery(fake, event.id);
  return event;
}

/** Decides by the present mode what becomes of an event's delivery. */
export function queueDelivery(fake: Fake, eventId: string): void {
  const { webhookMode, webhookDelayMs } = fake.state.settings;
  const isLate = webhookMode === 'delay' || webhookMode === 'shuffle';
  // Shuffled events wait a random part of the delay, so that they overtake one another.
  const wait = webhookMode === 'shuffle' ? Math.random() * webhookDelayMs : webhookDelayMs;
  fake.state.deliveries[eventId] = {
    attempts: 0,
    nextAttemptAtMs: Date.now() + (isLate ? Math.floor(wait) : 0),
    state: webhookMode === 'hold' ? 'held' : webhookMode === 'drop' ? 'dropped' : 'waiting',
    copies: webhookMode === 'duplicate' ? 2 : 1,
    lastStatus: null,
  };
  fake.store.touch();
}
