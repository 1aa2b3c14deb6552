import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import express from 'express';
import type { NextFunction, Request, Response } from 'express';
import { ZodError } from 'zod';
import { apiRouter } from './api.ts';
import { controlRouter } from './control/control-router.ts';
import { runDue } from './due-work.ts';
import type { Endpoint } from './endpoint.ts';
import type { Fake } from './fake.ts';
import { forgetOldAnswers } from './idempotency.ts';
import { onboardingPages } from './pages/onboarding-page.ts';
import { payPages } from './pages/pay-page.ts';
import { accountLinkEndpoints } from './resources/account-links.ts';
import { accountEndpoints } from './resources/accounts.ts';
import { balanceEndpoints } from './resources/balance.ts';
import { capabilityEndpoints } from './resources/capabilities.ts';
import { chargeEndpoints } from './resources/charges.ts';
import { checkoutSessionEndpoints } from './resources/checkout-sessions.ts';
import { disputeEndpoints } from './resources/disputes.ts';
import { eventEndpoints } from './resources/event-log.ts';
import { externalAccountEndpoints } from './resources/external-accounts.ts';
import { paymentIntentEndpoints } from './resources/payment-intents.ts';
import { payoutEndpoints } from './resources/payouts.ts';
import { refundEndpoints } from './resources/refunds.ts';
import { transferReversalEndpoints } from './resources/transfer-reversals.ts';
import { transferEndpoints } from './resources/transfers.ts';
import { webhookEndpointEndpoints } from './resources/webhook-endpoints.ts';
import { emptyState } from './state.ts';
import type { Settings, State } from './state.ts';
import { openStore, readState } from './store.ts';
import { startDelivery } from './webhook-delivery.ts';

export interface PaymentsFakeOptions {
  /** 0 takes a free port. */
  port?: number;
  host?: string;
  /** Empty keeps the state in memory only. */
  dataDir?: string;
  webhookUrl?: string;
  webhookSecret?: string;
  webhookTriesMax?: number;
  /** Base of the hosted pages; the server's own address when not given. */
  publicUrl?: string;
  settlementDelaySeconds?: number;
  payoutDelaySeconds?: number;
}

export interface RunningPaymentsFake {
  port: number;
  url: string;
  close(): Promise<void>;
}

const endpoints: Endpoint[] = [
  ...checkoutSessionEndpoints,
  ...paymentIntentEndpoints,
  ...chargeEndpoints,
  ...refundEndpoints,
  ...transferEndpoints,
  ...transferReversalEndpoints,
  ...accountEndpoints,
  ...accountLinkEndpoints,
  ...capabilityEndpoints,
  ...externalAccountEndpoints,
  ...payoutEndpoints,
  ...balanceEndpoints,
  ...disputeEndpoints,
  ...eventEndpoints,
  ...webhookEndpointEndpoints,
];

function createFake(options: PaymentsFakeOptions, initial: Settings): Fake {
  const dataDir = options.dataDir ?? '';
  const read = readState(dataDir);
  const fake = {
    options: {
      dataDir,
      webhookUrl: options.webhookUrl ?? '',
      webhookSecret: options.webhookSecret ?? 'whsec_local_stand_in',
      webhookTriesMax: options.webhookTriesMax ?? 14,
    },
    state: read ?? emptyState(initial),
    faults: [],
    runningKeys: new Set<string>(),
    publicUrl: '',
  } as Omit<Fake, 'store'> as Fake;
  fake.store = openStore(dataDir, (): State => fake.state);
  forgetOldAnswers(fake);
  return fake;
}

/** Control input that does not fit is told plainly; anything else is the stand-in's own failure. */
function lastResort(error: unknown, _request: Request, response: Response, next: NextFunction): void {
  if (response.headersSent) return next(error);
  if (error instanceof ZodError) {
    response.status(400).json({ error: error.issues });
    return;
  }
  const status = (error as { status?: unknown }).status;
  if (typeof status === 'number' && status < 500) {
    response.status(status).json({ error: 'the request could not be read' });
    return;
  }
  process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
  response.status(500).json({ error: 'the stand-in itself failed' });
}

/** Starts the stand-in for the payment service on loopback. */
export async function startPaymentsFake(options: PaymentsFakeOptions = {}): Promise<RunningPaymentsFake> {
  const initial: Settings = {
    settlementDelaySeconds: options.settlementDelaySeconds ?? 0,
    payoutDelaySeconds: options.payoutDelaySeconds ?? 5,
    webhookMode: 'normal',
    webhookDelayMs: 1000,
  };
  const fake = createFake(options, initial);
  const app = express();
  app.disable('x-powered-by');
  app.disable('etag');
  app.use(controlRouter(fake, initial), payPages(fake), onboardingPages(fake));
  app.use(apiRouter(fake, endpoints));
  app.use(lastResort);

  const host = options.host ?? '127.0.0.1';
  const server = createServer(app);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(options.port ?? 0, host, resolve);
  });
  const { port } = server.address() as AddressInfo;
  const url = `http://${host}:${port}`;
  fake.publicUrl = (options.publicUrl ?? url).replace(/\/$/, '');

  const stopDelivery = startDelivery(fake);
  const ticker = setInterval(() => runDue(fake), 200);
  return {
    port,
    url,
    async close() {
      clearInterval(ticker);
      stopDelivery();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      fake.store.flushNow();
    },
  };
}
