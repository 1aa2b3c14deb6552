import { createHmac } from 'node:crypto';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll } from 'vitest';
import { env } from '#server/env.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { startPaymentsFake } from '#tests/fakes/payments/start-payments-fake.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';

type Dump = { id: string; owner: string; value: Record<string, unknown> & { object: string } }[];
export type FaultOrder = {
  kind: '500' | '409' | '429' | '402' | 'reset' | 'hang' | 'html' | 'delay';
  path: string;
  method?: string;
  count?: number;
  stage?: 'before' | 'after' | 'saved';
  delayMs?: number;
};

export type PaymentsFake = {
  control: (path: string, body?: object) => Promise<Record<string, unknown>>;
  fault: (order: FaultOrder) => Promise<void>;
  noFaults: () => Promise<void>;
  webhooks: (
    mode: 'normal' | 'hold' | 'drop' | 'duplicate' | 'shuffle' | 'delay',
    delayMs?: number,
  ) => Promise<void>;
  flush: () => Promise<void>;
  pay: (sessionId: string, cardNumber?: string) => Promise<string>;
  /** Every object of a kind, of every account. */
  objects: (kind: string) => Promise<Dump>;
  /** Balance of an account in the stand-in's own books; `platform` is ours. */
  balance: (account: string) => Promise<bigint>;
  /** A seller whose account the stand-in knows and may pay out to. */
  seller: (bank?: string) => Promise<BuiltMember & { accountId: string }>;
};

/** Starts the stand-in where the product expects the payment service, with its messages going to the given application. */
export async function startPayments(appUrl: string, payoutDelaySeconds = 0): Promise<PaymentsFake> {
  const fake = await startPaymentsFake({
    port: Number.parseInt(new URL(env.STRIPE_API_BASE).port, 10),
    webhookUrl: `${appUrl}/api/v1/webhooks/stripe`,
    webhookSecret: env.STRIPE_WEBHOOK_SECRET,
    payoutDelaySeconds,
  });
  afterAll(() => fake.close());
  const ask = async (method: string, path: string, body?: object) => {
    const answer = await fetch(`${fake.url}/control/${path}`, {
      method,
      headers: { 'content-type': 'application/json' },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const told = (await answer.json()) as Record<string, unknown>;
    if (!answer.ok) throw new Error(`${path}: ${JSON.stringify(told)}`);
    return told;
  };
  const control = (path: string, body: object = {}) => ask('POST', path, body);
  return {
    control,
    fault: async (order) => void (await control('faults', order)),
    noFaults: async () => void (await ask('DELETE', 'faults')),
    webhooks: async (mode, delayMs) =>
      void (await control('webhooks', { mode, ...(delayMs === undefined ? {} : { delayMs }) })),
    flush: async () => void (await control('webhooks/flush')),
    pay: async (sessionId, cardNumber) =>
      String(
        (await control('pay', { sessionId, ...(cardNumber === undefined ? {} : { cardNumber }) }))['outcome'],
      ),
    objects: async (kind) => {
      const { objects } = (await ask('GET', 'dump')) as { objects: Dump };
      return objects.filter(({ value }) => value.object === kind);
    },
    balance: async (account) => {
      const { balances } = (await ask('GET', 'books')) as { balances: Record<string, number> };
      return BigInt(balances[account] ?? 0);
    },
    seller: async (bank) => {
      const idempotencyKey = `account:${Math.random()}`;
      const { accountId } = await paymentClient().createAccount({
        email: 'seller@scruple.example',
        memberId: 'test',
        idempotencyKey,
      });
      await control('onboard', { accountId, ...(bank === undefined ? {} : { bank }) });
      const member = await buildMember({ canSell: true, providerAccountId: accountId });
      return { ...member, accountId };
    },
  };
}

/** The signature header of a message, as the service makes it. */
export function signatureOf(
  body: string,
  { secret = env.STRIPE_WEBHOOK_SECRET, at = Math.floor(Date.now() / 1000) } = {},
): string {
  const mac = createHmac('sha256', secret).update(`${at}.${body}`).digest('hex');
  return `t=${at},v1=${mac}`;
}

/** Waits until something holds, as messages come on their own time; fails with the last error after the limit. */
export async function eventually<T>(probe: () => Promise<T>, limitMs = 8_000): Promise<T> {
  const deadline = Date.now() + limitMs;
  for (;;) {
    try {
      return await probe();
    } catch (error) {
      if (Date.now() > deadline) throw error;
      await sleep(40);
    }
  }
}
