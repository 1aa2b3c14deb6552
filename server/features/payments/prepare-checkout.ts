import { ConflictError, invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';

/** The provider's own least life of a session is 30 minutes; one more for the way there. */
const SESSION_MINUTES_MIN = 31;

/** Until the funding deadline, but never shorter than the provider allows. Whole seconds, as the provider counts. */
function expiryOf(deal: Deal, now: Date): Date {
  const earliest = now.getTime() + SESSION_MINUTES_MIN * 60_000;
  return new Date(Math.ceil(Math.max(deal.fundBy.getTime(), earliest) / 1000) * 1000);
}

/** The deal, when it may be paid now. */
async function findPayable(dealId: string, { tx, now }: Unit): Promise<Deal> {
  const deal = await Deal.findByPk(dealId, { transaction: tx });
  invariant(deal !== null, 'the deal was found before');
  if (deal.state !== 'agreed') {
    throw new ConflictError('illegal-transition', 'Only a deal that waits for its money can be paid.');
  }
  if (deal.frozenAt !== null) throw new ConflictError('deal-frozen');
  if (now >= deal.fundBy) {
    throw new ConflictError('deadline-passed', 'The time to start the payment is over.');
  }
  return deal;
}

/**
 * First half of starting a payment: makes the deal's one payment row, or answers the one that is there. A session that has
 * expired gives way to the next attempt. Locks: the deal is held by the caller.
 *
 * Throws `illegal-transition`, `deal-frozen`, `deadline-passed`.
 */
export async function prepareCheckout({ dealId }: { dealId: string }, unit: Unit): Promise<Payment> {
  const deal = await findPayable(dealId, unit);
  const payment = await Payment.findOne({ where: { dealId }, transaction: unit.tx });
  const expiresAt = expiryOf(deal, unit.now);
  if (payment === null) {
    return Payment.create(
      {
        id: newId(),
        dealId,
        state: 'starting',
        attempt: 1,
        providerSessionId: null,
        sessionUrl: null,
        amountMinor: deal.totalMinor,
        expiresAt,
      },
      { transaction: unit.tx },
    );
  }
  invariant(payment.state !== 'paid', 'a paid deal is not waiting for its money');
  if (payment.state !== 'expired') return payment;
  return payment.update(
    {
      state: 'starting',
      attempt: payment.attempt + 1,
      providerSessionId: null,
      sessionUrl: null,
      expiresAt,
    },
    { transaction: unit.tx },
  );
}

/**
 * The provider refused the attempt, or keeps a failure under its key, so no page came of it: the next attempt gets a fresh
 * expiry and key. Does nothing when another request has moved on already. Throws as `prepareCheckout`.
 */
export async function renewCheckout(
  { dealId, attempt }: { dealId: string; attempt: number },
  unit: Unit,
): Promise<Payment> {
  const deal = await findPayable(dealId, unit);
  const payment = await Payment.findOne({ where: { dealId }, transaction: unit.tx });
  invariant(payment !== null, 'the payment was prepared before');
  if (payment.state !== 'starting' || payment.attempt !== attempt) return payment;
  return payment.update(
    { attempt: attempt + 1, expiresAt: expiryOf(deal, unit.now) },
    { transaction: unit.tx },
  );
}

/**
 * Second half: keeps the session that the provider made. A payment that was closed in the meantime stays closed.
 *
 * Throws `illegal-transition`, `deal-frozen`, `deadline-passed`.
 */
export async function openCheckout(
  { dealId, attempt, sessionId, url }: { dealId: string; attempt: number; sessionId: string; url: string },
  unit: Unit,
): Promise<Payment> {
  const payment = await Payment.findOne({ where: { dealId }, transaction: unit.tx });
  invariant(payment !== null, 'the payment was prepared before');
  if (payment.attempt === attempt && payment.state === 'starting') {
    await payment.update(
      { state: 'open', providerSessionId: sessionId, sessionUrl: url },
      { transaction: unit.tx },
    );
  }
  if (payment.state !== 'open') {
    await findPayable(dealId, unit);
    throw new ConflictError('illegal-transition', 'The payment was closed while it started. Start it again.');
  }
  return payment;
}
