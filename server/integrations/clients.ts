import { env } from '#server/env.ts';
import { createCarrierClient, type CarrierClient } from './carrier.ts';
import { createMailer, type Mailer } from './mail.ts';
import { createPaymentClient, type PaymentClient } from './payments.ts';
import { createQuoteClient, type QuoteClient } from './quotes.ts';

let quotes: QuoteClient | undefined;
let mail: Mailer | undefined;
let carrier: CarrierClient | undefined;
let payments: PaymentClient | undefined;

/** The configured services, one client each for the life of the process. Apart from the factories, so that those need no environment. */
export function quoteClient(): QuoteClient {
  return (quotes ??= createQuoteClient({ url: env.QUOTES_URL, apiKey: env.QUOTES_API_KEY }));
}

export function mailer(): Mailer {
  return (mail ??= createMailer({ smtpUrl: env.SMTP_URL, from: env.MAIL_FROM }));
}

export function carrierClient(): CarrierClient {
  return (carrier ??= createCarrierClient({ url: env.CARRIER_URL, apiKey: env.CARRIER_API_KEY }));
}

export function paymentClient(): PaymentClient {
  return (payments ??= createPaymentClient({
    secretKey: env.STRIPE_SECRET_KEY,
    webhookSecret: env.STRIPE_WEBHOOK_SECRET,
    apiBase: env.STRIPE_API_BASE,
  }));
}

/** Lets go of the pooled mail connections, so that the process can end. */
export function closeClients(): void {
  mail?.close();
  mail = undefined;
}
