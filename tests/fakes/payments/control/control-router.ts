import express from 'express';
import type { Response, Router } from 'express';
import { z } from 'zod';
import { booksReport } from '../balances.ts';
import { couldNotProcess, isKnownBank, payingBank, payoutFailureOf } from '../banks.ts';
import { lookUp, ownerOf, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { faultInput } from '../faults.ts';
import { forgetOldAnswers } from '../idempotency.ts';
import { runDue } from '../due-work.ts';
import { controlPage } from '../pages/control-page.ts';
import { completeOnboarding } from '../resources/account-state.ts';
import { paySession, testCard } from '../resources/pay-session.ts';
import { markFailed, markPaid } from '../resources/payout-progress.ts';
import { failRefund } from '../resources/refunds.ts';
import { emptyState } from '../state.ts';
import type { Settings } from '../state.ts';
import { disputeControls } from './dispute-controls.ts';
import { done } from './done.ts';
import { webhookControls } from './webhook-controls.ts';

const seconds = z.coerce
  .number()
  .int()
  .min(0)
  .max(400 * 86_400);

/** Backwards as well, so that a demo can be told from its beginning. */
const clockInput = z.strictObject({
  advanceSeconds: z.coerce
    .number()
    .int()
    .min(-400 * 86_400)
    .max(400 * 86_400),
});

const payInput = z.strictObject({
  sessionId: z.string(),
  cardNumber: z.string().default('4242424242424242'),
});
const onboardInput = z.strictObject({
  accountId: z.string(),
  bank: z.string().refine(isKnownBank, 'not a published test number').default(payingBank),
  name: z.string().default('Test Payee'),
});
const settingsInput = z
  .strictObject({ settlementDelaySeconds: seconds, payoutDelaySeconds: seconds })
  .partial();
const failInput = z.strictObject({ code: z.string().optional() });

function missing(response: Response, what: string): void {
  response.status(404).json({ error: `no such ${what}` });
}

function moneyControls(fake: Fake): Router {
  const router = express.Router();
  router.post('/pay', async (request, response) => {
    const input = payInput.parse(request.body ?? {});
    const session = lookUp(fake, 'checkout.session', input.sessionId);
    if (!session) return missing(response, 'session');
    const result = paySession(fake, session, testCard(input.cardNumber.replaceAll(' ', '')));
    await done(fake, request, response, result);
  });
  router.post('/onboard', async (request, response) => {
    const input = onboardInput.parse(request.body ?? {});
    const account = lookUp(fake, 'account', input.accountId);
    if (!account) return missing(response, 'account');
    completeOnboarding(fake, account, { name: input.name, bankNumber: input.bank });
    await done(fake, request, response, account);
  });
  router.post('/payouts/:id/:action', async (request, response) => {
    const payout = lookUp(fake, 'payout', request.params.id);
    if (!payout) return missing(response, 'payout');
    const { code } = failInput.parse(request.body ?? {});
    const failure = code === undefined ? couldNotProcess : { ...couldNotProcess, code };
    const plannedNumber = fake.state.payoutPlans[payout.id]?.bankNumber ?? payingBank;
    const isDone =
      request.params.action === 'pay'
        ? markPaid(fake, payout)
        : request.params.action === 'fail' &&
          markFailed(fake, payout, payoutFailureOf(plannedNumber) ?? failure);
    if (!isDone) response.status(409);
    await done(fake, request, response, payout);
  });
  router.post('/refunds/:id/fail', async (request, response) => {
    const refund = lookUp(fake, 'refund', request.params.id);
    if (!refund) return missing(response, 'refund');
    if (!failRefund(fake, refund)) response.status(409);
    await done(fake, request, response, refund);
  });
  return router;
}

function readControls(fake: Fake): Router {
  const router = express.Router();
  router.get('/health', (_request, response) => void response.json({ ready: true }));
  router.get('/books', (_request, response) => void response.json(booksReport(fake)));
  router.get('/dump', (_request, response) => {
    const objects = Object.entries(fake.state.objects).map(([id, stored]) => ({
      id,
      owner: ownerOf(fake, id) ?? platform,
      value: stored.value,
    }));
    const { settings, clockOffsetSeconds, deliveries } = fake.state;
    response.json({ objects, deliveries, settings, clockOffsetSeconds, books: booksReport(fake) });
  });
  return router;
}

function stateControls(fake: Fake, initial: Settings): Router {
  const router = express.Router();
  router.post('/clock', async (request, response) => {
    const { advanceSeconds } = clockInput.parse(request.body ?? {});
    fake.state.clockOffsetSeconds += advanceSeconds;
    fake.store.touch();
    runDue(fake);
    forgetOldAnswers(fake);
    await done(fake, request, response, { clockOffsetSeconds: fake.state.clockOffsetSeconds });
  });
  router.post('/settings', async (request, response) => {
    Object.assign(fake.state.settings, settingsInput.parse(request.body ?? {}));
    fake.store.touch();
    await done(fake, request, response, fake.state.settings);
  });
  router.post('/faults', async (request, response) => {
    fake.faults.push(faultInput.parse(request.body ?? {}));
    await done(fake, request, response, { faults: fake.faults });
  });
  router.delete('/faults', (_request, response) => {
    fake.faults.length = 0;
    response.json({ faults: [] });
  });
  router.post('/reset', async (request, response) => {
    fake.state = emptyState(initial);
    fake.faults.length = 0;
    fake.runningKeys.clear();
    fake.store.touch();
    await done(fake, request, response, { reset: true });
  });
  return router;
}

/** The control interface: no part of the real API, so under its own prefix and without keys. */
export function controlRouter(fake: Fake, initial: Settings): Router {
  const router = express.Router();
  router.get('/', (_request, response) => void response.type('html').send(controlPage(fake)));
  const controls = express.Router();
  controls.use(express.json(), express.urlencoded({ extended: false }));
  controls.use(readControls(fake), stateControls(fake, initial), moneyControls(fake), webhookControls(fake));
  controls.use(disputeControls(fake));
  router.use('/control', controls);
  return router;
}
