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
import { PROVIDER_EVENT_READERS } from './provider-event-readers.ts';
import { countProviderEvent, recordProviderEvent, type EventOutcome } from './record-provider-event.ts';

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
  const read = PROVIDER_EVENT_READERS[event.type];
  const plan = read === undefined ? null : await asRefusal(() => read(event));
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
      const outcome = await receive(event);
      logger.info({ event: event.id, type: event.type, outcome }, 'provider message');
      res.json({ received: true, outcome });
    },
  }),
];
