import express from 'express';
import type { Router } from 'express';
import { z } from 'zod';
import { lookUp } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { closeDispute, openDispute } from '../resources/dispute-progress.ts';
import { done } from './done.ts';

const openInput = z.strictObject({
  chargeId: z.string(),
  reason: z.string().default('product_not_received'),
});

export function disputeControls(fake: Fake): Router {
  const router = express.Router();
  router.post('/disputes', async (request, response) => {
    const input = openInput.parse(request.body ?? {});
    const charge = lookUp(fake, 'charge', input.chargeId);
    if (!charge) return void response.status(404).json({ error: 'no such charge' });
    const dispute = openDispute(fake, charge, input.reason);
    if (!dispute) response.status(409);
    await done(fake, request, response, dispute);
  });
  router.post('/disputes/:id/:outcome', async (request, response) => {
    const dispute = lookUp(fake, 'dispute', request.params.id);
    const outcome = request.params.outcome;
    if (!dispute || (outcome !== 'won' && outcome !== 'lost')) {
      return void response.status(404).json({ error: 'no such dispute' });
    }
    if (!closeDispute(fake, dispute, outcome)) response.status(409);
    await done(fake, request, response, dispute);
  });
  return router;
}
