import express from 'express';
import type { Router } from 'express';
import type Stripe from 'stripe';
import { z } from 'zod';
import { keep, lookUp, newId, ownerOf, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { webhookModes } from '../state.ts';
import { done } from './done.ts';

const modeInput = z.strictObject({
  mode: z.enum(webhookModes),
  delayMs: z.coerce.number().int().min(0).max(3_600_000).optional(),
});
const redeliverInput = z.strictObject({
  eventId: z.string(),
  /** Tells the same happening once more under a new event id, as the real service now and then does. */
  asNewEvent: z.boolean().default(false),
});

function sendNow(fake: Fake, eventId: string): void {
  fake.state.deliveries[eventId] = {
    attempts: 0,
    nextAttemptAtMs: Date.now(),
    state: 'waiting',
    copies: 1,
    lastStatus: null,
  };
  fake.store.touch();
}

function copyOf(fake: Fake, event: Stripe.Event): Stripe.Event {
  const copy = { ...structuredClone(event), id: newId('evt'), pending_webhooks: 1 };
  return keep<Stripe.Event>(fake, ownerOf(fake, event.id) ?? platform, copy);
}

export function webhookControls(fake: Fake): Router {
  const router = express.Router();
  router.post('/webhooks', async (request, response) => {
    const input = modeInput.parse(request.body ?? {});
    fake.state.settings.webhookMode = input.mode;
    if (input.delayMs !== undefined) fake.state.settings.webhookDelayMs = input.delayMs;
    fake.store.touch();
    await done(fake, request, response, fake.state.settings);
  });
  router.post('/webhooks/flush', async (request, response) => {
    const late = Object.entries(fake.state.deliveries).filter(
      ([, delivery]) => delivery.state !== 'delivered',
    );
    for (const [eventId] of late) sendNow(fake, eventId);
    await done(fake, request, response, { flushed: late.length });
  });
  router.post('/webhooks/redeliver', async (request, response) => {
    const input = redeliverInput.parse(request.body ?? {});
    if (fake.options.webhookUrl === '')
      return void response.status(409).json({ error: 'no webhook configured' });
    const event = lookUp(fake, 'event', input.eventId);
    if (!event) return void response.status(404).json({ error: 'no such event' });
    const told = input.asNewEvent ? copyOf(fake, event) : event;
    sendNow(fake, told.id);
    await done(fake, request, response, { eventId: told.id });
  });
  return router;
}
