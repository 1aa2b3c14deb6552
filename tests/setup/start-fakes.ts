import { startCarrierFake } from '../fakes/carrier/start-carrier-fake.ts';
import { startMailFake } from '../fakes/mail/start-mail-fake.ts';
import { startPaymentsFake } from '../fakes/payments/start-payments-fake.ts';
import { startQuotesFake } from '../fakes/quotes/start-quotes-fake.ts';

function portOf(name: string): number {
  return Number.parseInt(new URL(process.env[name] ?? '').port, 10);
}

/**
 * Starts the four stand-ins, in memory, where the environment of this test file says that the services are. Webhooks go
 * to the product's own port unless `webhookUrl` names another place.
 */
export async function startFakes(options: { webhookUrl?: string } = {}) {
  const webhookUrl = options.webhookUrl ?? `http://127.0.0.1:${process.env.PORT}/api/v1/webhooks/stripe`;
  const payments = await startPaymentsFake({
    port: portOf('STRIPE_API_BASE'),
    webhookUrl,
    webhookSecret: process.env.STRIPE_WEBHOOK_SECRET ?? '',
  });
  const quotes = await startQuotesFake({ port: portOf('QUOTES_URL'), apiKey: process.env.QUOTES_API_KEY });
  const mail = await startMailFake({ port: 0, smtpPort: portOf('SMTP_URL') });
  const carrier = await startCarrierFake({
    port: portOf('CARRIER_URL'),
    apiKey: process.env.CARRIER_API_KEY,
  });
  const close = async () => {
    await Promise.all([payments, quotes, mail, carrier].map((fake) => fake.close()));
  };
  return { payments, quotes, mail, carrier, close };
}
