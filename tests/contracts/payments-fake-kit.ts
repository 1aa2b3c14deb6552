import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import Stripe from 'stripe';
import { startPaymentsFake } from '#tests/fakes/payments/start-payments-fake.ts';
import type { PaymentsFakeOptions } from '#tests/fakes/payments/start-payments-fake.ts';

export const webhookSecret = 'whsec_contract';

export function clientFor(port: number, retries = 0): Stripe {
  return new Stripe('sk_test_contract', {
    host: '127.0.0.1',
    port,
    protocol: 'http',
    telemetry: false,
    maxNetworkRetries: retries,
    timeout: 3000,
  });
}

export async function postJson(url: string, body: unknown): Promise<unknown> {
  const response = await fetch(url, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  return response.json();
}

export async function waitFor<T>(read: () => T | Promise<T>, isRight: (value: T) => boolean): Promise<T> {
  const until = Date.now() + 8000;
  for (;;) {
    const value = await read();
    if (isRight(value)) return value;
    if (Date.now() > until) throw new Error(`Waited in vain; last seen: ${JSON.stringify(value)}`);
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}

export interface Received {
  event: Stripe.Event;
  body: string;
  signature: string;
}

/** A receiver that checks each signature with the SDK. `answers` is consumed first, then it answers 200. */
export async function startReceiver() {
  const received: Received[] = [];
  const forged: string[] = [];
  const answers: number[] = [];
  const verifier = new Stripe('sk_test_contract');
  const server = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      const body = Buffer.concat(chunks).toString('utf8');
      const signature = String(request.headers['stripe-signature']);
      try {
        const event = verifier.webhooks.constructEvent(body, signature, webhookSecret);
        received.push({ event, body, signature });
      } catch {
        forged.push(body);
      }
      response.writeHead(answers.shift() ?? 200).end();
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}/webhook`,
    received,
    forged,
    answers,
    async close() {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
    },
  };
}

export async function startKit(options: PaymentsFakeOptions = {}) {
  const fake = await startPaymentsFake({ payoutDelaySeconds: 60, webhookSecret, ...options });
  const stripe = clientFor(fake.port);

  const control = (path: string, body: unknown = {}): Promise<unknown> =>
    postJson(`${fake.url}/control/${path}`, body);

  const openSession = (minor = 10_000, more: Partial<Stripe.Checkout.SessionCreateParams> = {}) =>
    stripe.checkout.sessions.create({
      mode: 'payment',
      success_url: 'http://127.0.0.1:9/done?session={CHECKOUT_SESSION_ID}',
      cancel_url: 'http://127.0.0.1:9/back',
      line_items: [
        {
          quantity: 1,
          price_data: { currency: 'usd', unit_amount: minor, product_data: { name: 'Gold button' } },
        },
      ],
      ...more,
    });

  const paidCharge = async (minor = 10_000, group?: string): Promise<Stripe.Charge> => {
    const session = await openSession(minor, group ? { payment_intent_data: { transfer_group: group } } : {});
    await control('pay', { sessionId: session.id });
    const paid = await stripe.checkout.sessions.retrieve(session.id, {
      expand: ['payment_intent.latest_charge'],
    });
    return (paid.payment_intent as Stripe.PaymentIntent).latest_charge as Stripe.Charge;
  };

  const newAccount = () =>
    stripe.accounts.create({
      type: 'express',
      country: 'US',
      email: 'seller@members.example',
      capabilities: { transfers: { requested: true } },
      settings: { payouts: { schedule: { interval: 'manual' } } },
    });

  const payee = async (bank = '000123456789'): Promise<Stripe.Account> => {
    const account = await newAccount();
    await control('onboard', { accountId: account.id, bank });
    return stripe.accounts.retrieve(account.id);
  };

  const books = async () =>
    (await (await fetch(`${fake.url}/control/books`)).json()) as {
      balances: Record<string, number>;
      sum: number;
      differences: unknown[];
      journals: Array<{ source: string; legs: Array<{ account: string; amount: number }> }>;
    };

  return { ...fake, stripe, control, openSession, paidCharge, newAccount, payee, books };
}
export type Kit = Awaited<ReturnType<typeof startKit>>;

/** The error of a call that has to fail. */
export async function failureOf(
  call: Promise<unknown>,
): Promise<InstanceType<typeof Stripe.errors.StripeError>> {
  try {
    await call;
  } catch (error) {
    if (error instanceof Stripe.errors.StripeError) return error;
    throw error;
  }
  throw new Error('The call was expected to fail and did not');
}
