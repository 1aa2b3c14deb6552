import type Stripe from 'stripe';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Call, Endpoint } from '../endpoint.ts';
import { invalidRequest, refused } from '../errors.ts';
import { emit } from '../events.ts';
import type { RequestNote } from '../events.ts';
import { allOf, idOf, keep, now, platform, wallNow } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { listInput, mergeMetadata, metadata, text } from '../input.ts';
import { paginate } from '../paginate.ts';
import { createSessionInput } from './checkout-input.ts';
import type { CreateSession } from './checkout-input.ts';
import { cancelIntent } from './payment-intents.ts';
import { buildItem, buildSession } from './session-builder.ts';

const halfHour = 30 * 60;
const day = 24 * 60 * 60;
/** A request may be a little slow on its way without breaking a bound. */
const grace = 60;

function isWithinBounds(seconds: number): boolean {
  return seconds >= halfHour - grace && seconds <= day + grace;
}

/**
 * Callers reckon `expires_at` by their own clock: real time, which does not move with ours, or the past in which a demo is
 * being told. So the bounds hold against either, and the session then lives that long on the fake's clock.
 */
function lifetime(fake: Fake, expiresAt: number | undefined): number {
  if (expiresAt === undefined) return day;
  const found = [expiresAt - wallNow(), expiresAt - now(fake)].find(isWithinBounds);
  if (found === undefined) {
    throw invalidRequest(
      'The `expires_at` timestamp must be between 30 minutes and 24 hours from Checkout Session creation.',
      undefined,
      'expires_at',
    );
  }
  return found;
}

function createSession(call: Call<CreateSession>): Stripe.Checkout.Session {
  const { fake, input } = call;
  for (const param of ['success_url', 'cancel_url'] as const) {
    const value = input[param]?.replaceAll('{CHECKOUT_SESSION_ID}', 'x');
    if (value !== undefined && !(URL.canParse(value) && /^https?:/.test(value))) {
      throw invalidRequest('Not a valid URL', 'url_invalid', param);
    }
  }
  const seconds = lifetime(fake, input.expires_at);
  const items = input.line_items.map((item) => buildItem(fake, item));
  const total = items.reduce((sum, item) => sum + item.amount_total, 0);
  if (total < 50) {
    throw invalidRequest('The total must convert to at least 50 cents.', 'amount_too_small');
  }
  if (total > 99_999_999) {
    throw invalidRequest('The total must be no more than $999,999.99.', 'amount_too_large');
  }
  const session = buildSession(fake, input, total, wallNow() + seconds);
  keep(fake, call.owner, session);
  fake.state.sessionDetails[session.id] = {
    items,
    expiresAt: now(fake) + seconds,
    transferGroup: input.payment_intent_data?.transfer_group ?? null,
    intentMetadata: { ...input.payment_intent_data?.metadata },
    description: input.payment_intent_data?.description ?? null,
  };
  return session;
}

export function expireSession(fake: Fake, session: Stripe.Checkout.Session, request?: RequestNote): void {
  session.status = 'expired';
  session.url = null;
  const intent = idOf(session.payment_intent);
  if (intent) cancelIntent(fake, intent, 'automatic', request);
  emit(fake, platform, 'checkout.session.expired', session, { ...(request && { request }) });
  fake.store.touch();
}

/** Expires the open sessions whose time has come; true when there were any. */
export function expireDue(fake: Fake): boolean {
  const due = allOf(fake, 'checkout.session').filter(
    (session) =>
      session.status === 'open' && (fake.state.sessionDetails[session.id]?.expiresAt ?? 0) <= now(fake),
  );
  for (const session of due) expireSession(fake, session);
  return due.length > 0;
}

export const checkoutSessionEndpoints: Endpoint[] = [
  endpoint('POST', '/v1/checkout/sessions', createSessionInput, createSession),
  endpoint(
    'GET',
    '/v1/checkout/sessions',
    { ...listInput, payment_intent: text.optional(), status: text.optional() },
    (call) => {
      const { payment_intent: intent, status } = call.input;
      const sessions = allOf(call.fake, 'checkout.session', call.owner).filter(
        (session) =>
          (intent === undefined || session.payment_intent === intent) &&
          (status === undefined || session.status === status),
      );
      return paginate(sessions, call.input, '/v1/checkout/sessions');
    },
  ),
  endpoint('GET', '/v1/checkout/sessions/:id', {}, (call) => find(call, 'checkout.session', pathId(call))),
  endpoint('POST', '/v1/checkout/sessions/:id', { metadata: metadata.optional() }, (call) => {
    const session = find(call, 'checkout.session', pathId(call));
    session.metadata = mergeMetadata(session.metadata ?? {}, call.input.metadata);
    call.fake.store.touch();
    return session;
  }),
  endpoint('GET', '/v1/checkout/sessions/:id/line_items', { ...listInput }, (call) => {
    const session = find(call, 'checkout.session', pathId(call));
    const items = call.fake.state.sessionDetails[session.id]?.items ?? [];
    return paginate(items, call.input, `/v1/checkout/sessions/${session.id}/line_items`);
  }),
  endpoint('POST', '/v1/checkout/sessions/:id/expire', {}, (call) => {
    const session = find(call, 'checkout.session', pathId(call));
    if (session.status !== 'open') {
      throw refused(
        `Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of ${session.status}.`,
      );
    }
    expireSession(call.fake, session, call.request);
    return session;
  }),
];
