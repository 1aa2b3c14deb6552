import express from 'express';
import { UniqueConstraintError } from 'sequelize';
import { AppError } from '#server/app-error.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import type { PaymentEvent } from '#server/integrations/payment-readings.ts';
import { logger } from '#server/logger.ts';
import { ProviderEvent } from '#server/models/provider-event.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { asRefusal } from '#server/features/payments/as-refusal.ts';
import type { ProviderEventPlan } from './provider-event-reader.ts';
import { PROVIDER_EVENT_READERS } from './provider-event-readers.ts';
import { countProviderEvent, recordProviderEvent, type EventOutcome } from './record-provider-event.ts';

/** What the columns hold; an id of the provider's is far shorter. */
const ID_TEXT = /^[\w.:-]{1,120}$/;
const ACCOUNT_TEXT = /^[\w.:-]{1,64}$/;

/** Refuses a message that could not be kept; the signature says who sent it, not that it is well formed. */
function assertReadable({ id, objectId, accountId }: PaymentEvent): void {
  const isReadable =
    ID_TEXT.test(id) && ID_TEXT.test(objectId) && (accountId === null || ACCOUNT_TEXT.test(accountId));
  if (!isReadable) throw new AppError('malformed-request', 'The message has no id that can be kept.');
}

/** A message about something that the provider itself does not know will not become readable by coming again. */
async function planFor(event: PaymentEvent): Promise<ProviderEventPlan | null> {
  const read = PROVIDER_EVENT_READERS[event.type];
  if (read === undefined) return null;
  try {
    return await read(event);
  } catch (error) {
    if (!(error instanceof PaymentProviderError) || error.code !== 'resource_missing') throw error;
    logger.warn({ event: event.id, object: event.objectId }, 'a provider message about an unknown object');
    return null;
  }
}

function readSigned(body: unknown, signature: string | undefined): PaymentEvent {
  if (!Buffer.isBuffer(body) || signature === undefined) throw new AppError('signature-invalid');
  try {
    return paymentClient().constructEvent(body, signature);
  } catch (error) {
    if (error instanceof PaymentProviderError) throw new AppError('signature-invalid', error.message);
    throw error;
  }
}

/**
 * A message that came before is counted and no more. The provider is asked outside the transaction; where it does not
 * answer, neither do we with success, so that the message comes again.
 */
async function receive(event: PaymentEvent): Promise<EventOutcome | 'duplicate'> {
  const isKnown = await ProviderEvent.findByPk(event.id, { attributes: ['id'] });
  if (isKnown !== null) {
    await withTransaction({}, (unit) => countProviderEvent({ eventId: event.id }, unit));
    return 'duplicate';
  }
  const plan = await asRefusal(() => planFor(event));
  try {
    return await withTransaction(plan?.locks ?? {}, (unit) => recordProviderEvent({ event, plan }, unit));
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    const wasCounted = await withTransaction({}, (unit) => countProviderEvent({ eventId: event.id }, unit));
    if (!wasCounted) throw error;
    return 'duplicate';
  }
}

export const webhookRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: '/api/v1/webhooks/stripe',
    summary: 'Signed messages of the payment provider',
    access: 'signed',
    limit: 'webhook',
    csrf: 'exempt',
    before: [express.raw({ type: () => true, limit: '1mb' })],
    handle: async ({ req, res }) => {
      const event = readSigned(req.body as unknown, req.get('stripe-signature'));
      assertReadable(event);
      const outcome = await receive(event);
      logger.info({ event: event.id, type: event.type, outcome }, 'provider message');
      res.json({ received: true, outcome });
    },
  }),
];
