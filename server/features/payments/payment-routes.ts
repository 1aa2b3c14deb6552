import { dealParams, refreshPaymentAnswer, startPaymentAnswer } from '#shared/schemas/deals.ts';
import type { z } from 'zod';
import { AppError, ForbiddenError, NotFoundError, invariant } from '#server/app-error.ts';
import { storedAnswer, withIdempotentTransaction } from '#server/database/idempotent-transaction.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { needsNewKey } from '#server/integrations/payment-errors.ts';
import type { CheckoutReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import {
  defineRoute,
  type Actor,
  type IdempotencyTicket,
  type RouteDefinition,
} from '#server/routing/define-route.ts';
import { applyCheckout } from './apply-checkout.ts';
import { asRefusal } from './as-refusal.ts';
import { checkoutOrder } from './checkout-order.ts';
import { locksOf } from './deal-locks.ts';
import { canPay, canSeePayment } from './payment-policy.ts';
import { openCheckout, prepareCheckout, renewCheckout } from './prepare-checkout.ts';

type Params = z.infer<typeof dealParams>;

async function findPayersDeal(code: string, actor: Actor): Promise<Deal> {
  const deal = await Deal.findOne({ where: { code } });
  if (deal === null || !canSeePayment(actor, deal)) throw new NotFoundError();
  if (!canPay(actor, deal)) throw new ForbiddenError();
  return deal;
}

/** A refusal for a state reason burns the key, also when it comes before the provider was asked. */
async function prepare(deal: Deal, ticket: IdempotencyTicket | null): Promise<Payment> {
  try {
    return await withTransaction(locksOf(deal), (unit) => prepareCheckout({ dealId: deal.id }, unit));
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    await withIdempotentTransaction(ticket, {}, () => Promise.reject(error));
    throw error;
  }
}

type Started = { payment: Payment; reading: CheckoutReading };

/**
 * Asks for the session under a key that stands for this attempt, so that any number of requests get the one session. An
 * order that waited too long is refused as such, and a failure may be kept under the key: then it is renewed once. Of an
 * attempt that was given up nobody has ever had the page, so there is never more than one that can be paid.
 */
async function start(deal: Deal, prepared: Payment): Promise<Started> {
  const provider = paymentClient();
  try {
    return { payment: prepared, reading: await provider.createCheckout(await checkoutOrder(prepared)) };
  } catch (error) {
    if (!needsNewKey(error)) throw error;
    const payment = await withTransaction(locksOf(deal), (unit) =>
      renewCheckout({ dealId: deal.id, attempt: prepared.attempt }, unit),
    );
    return { payment, reading: await provider.createCheckout(await checkoutOrder(payment)) };
  }
}

type Opened = { attempt: number; sessionId: string; url: string };

function pageOf({ attempt, providerSessionId, sessionUrl }: Payment): Opened {
  invariant(providerSessionId !== null && sessionUrl !== null, 'an open payment has its page');
  return { attempt, sessionId: providerSessionId, url: sessionUrl };
}

/** The page of the one session; a request that the provider sent away may find that its twin was let in. */
async function openedBy(deal: Deal, prepared: Payment): Promise<Opened> {
  if (prepared.state === 'open') return pageOf(prepared);
  try {
    const { payment, reading } = await asRefusal(() => start(deal, prepared));
    if (reading.url === null) throw new AppError('payment-provider-unavailable');
    return { attempt: payment.attempt, sessionId: reading.sessionId, url: reading.url };
  } catch (error) {
    const payment = await prepared.reload();
    if (payment.state === 'open') return pageOf(payment);
    throw error;
  }
}

const startPaymentRoute = defineRoute<Params>({
  method: 'post',
  path: '/api/v1/deals/:code/payment',
  summary: "Start or continue the buyer's payment on the provider's page",
  access: 'member',
  limit: 'write',
  movesMoney: true,
  params: dealParams,
  answer: startPaymentAnswer,
  handle: async ({ params, actor, idempotency, res }) => {
    const deal = await findPayersDeal(params.code, actor);
    const known = await storedAnswer(idempotency);
    if (known !== null) return void res.status(known.status).json(known.answer);
    const opened = await openedBy(deal, await prepare(deal, idempotency));
    const stored = await withIdempotentTransaction(idempotency, locksOf(deal), async (unit) => {
      const payment = await openCheckout({ dealId: deal.id, ...opened }, unit);
      const answer = { url: payment.sessionUrl, expiresAt: payment.expiresAt.toISOString() };
      return { status: 200, answer };
    });
    res.status(stored.status).json(stored.answer);
  },
});

const refreshPaymentRoute = defineRoute<Params>({
  method: 'post',
  path: '/api/v1/deals/:code/payment/refresh',
  summary: 'Ask the provider how the payment stands, after the return from its page',
  access: 'member',
  limit: 'write',
  params: dealParams,
  answer: refreshPaymentAnswer,
  handle: async ({ params, actor, res }) => {
    const deal = await findPayersDeal(params.code, actor);
    const payment = await Payment.findOne({ where: { dealId: deal.id } });
    const sessionId = payment?.providerSessionId ?? null;
    if (sessionId !== null && payment?.state !== 'paid') {
      const reading = await asRefusal(() => paymentClient().readCheckout(sessionId));
      await asRefusal(() =>
        withTransaction(locksOf(deal), (unit) => applyCheckout({ dealId: deal.id, reading }, unit)),
      );
    }
    await deal.reload();
    await payment?.reload();
    res.json({ state: deal.state, payment: payment?.state ?? 'none' });
  },
});

export const paymentRoutes: RouteDefinition[] = [startPaymentRoute, refreshPaymentRoute];
