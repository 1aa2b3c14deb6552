import { createHmac } from 'node:crypto';
import { mustFind, wallNow } from './fake.ts';
import type { Fake } from './fake.ts';

const attemptTimeoutMs = 5_000;
const backoffMaxMs = 60_000;

/** `t` is real time, whatever the fake's clock says: receivers compare it with theirs. */
export function signatureHeader(secret: string, body: string, timestamp: number): string {
  const signature = createHmac('sha256', secret).update(`${timestamp}.${body}`).digest('hex');
  return `t=${timestamp},v1=${signature}`;
}

async function post(fake: Fake, body: string): Promise<number | null> {
  try {
    const response = await fetch(fake.options.webhookUrl, {
      method: 'POST',
      headers: {
        'content-type': 'application/json; charset=utf-8',
        'stripe-signature': signatureHeader(fake.options.webhookSecret, body, wallNow()),
      },
      body,
      redirect: 'manual',
      signal: AbortSignal.timeout(attemptTimeoutMs),
    });
    await response.arrayBuffer();
    return response.status;
  } catch {
    // No answer counts like a refusal: the event is tried again.
    return null;
  }
}

async function attempt(fake: Fake, eventId: string): Promise<void> {
  const delivery = fake.state.deliveries[eventId];
  if (!delivery) return;
  const event = mustFind(fake, 'event', eventId);
  await fake.store.flushed();
  const status = await post(fake, JSON.stringify(event, null, 2));
  delivery.attempts += 1;
  delivery.lastStatus = status;
  if (status !== null && status >= 200 && status < 300) {
    delivery.copies -= 1;
    if (delivery.copies > 0) return;
    delivery.state = 'delivered';
    event.pending_webhooks = 0;
  } else if (delivery.attempts >= fake.options.webhookTriesMax) {
    delivery.state = 'given_up';
  } else {
    const backoffMs = Math.min(backoffMaxMs, 1000 * 2 ** (delivery.attempts - 1));
    delivery.nextAttemptAtMs = Date.now() + backoffMs;
  }
  fake.store.touch();
}

/** Sends what is due, oldest due first and one at a time; a failing one never holds up the others. */
export function startDelivery(fake: Fake): () => void {
  let isRunning = false;
  const run = async (): Promise<void> => {
    if (isRunning) return;
    isRunning = true;
    try {
      const at = Date.now();
      const due = Object.entries(fake.state.deliveries)
        .filter(([, delivery]) => delivery.state === 'waiting' && delivery.nextAttemptAtMs <= at)
        .sort(([, a], [, b]) => a.nextAttemptAtMs - b.nextAttemptAtMs);
      for (const [eventId] of due) await attempt(fake, eventId);
    } finally {
      isRunning = false;
    }
  };
  const timer = setInterval(() => void run(), 25);
  return () => clearInterval(timer);
}
