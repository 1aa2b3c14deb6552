import { startPaymentsFake } from './start-payments-fake.ts';

function text(name: string): string {
  return process.env[name] ?? '';
}

function integer(name: string, otherwise: number): number {
  const value = text(name);
  if (value === '') return otherwise;
  if (!/^\d+$/.test(value)) throw new Error(`${name} must be a whole number, not ${value}`);
  return Number.parseInt(value, 10);
}

const fake = await startPaymentsFake({
  port: integer('FAKE_PORT', 4101),
  dataDir: text('FAKE_DATA_DIR'),
  webhookUrl: text('FAKE_WEBHOOK_URL'),
  ...(text('FAKE_WEBHOOK_SECRET') !== '' && { webhookSecret: text('FAKE_WEBHOOK_SECRET') }),
  ...(text('FAKE_PUBLIC_URL') !== '' && { publicUrl: text('FAKE_PUBLIC_URL') }),
  webhookTriesMax: integer('FAKE_WEBHOOK_TRIES', 14),
  settlementDelaySeconds: integer('FAKE_SETTLEMENT_DELAY_SECONDS', 0),
  payoutDelaySeconds: integer('FAKE_PAYOUT_DELAY_SECONDS', 5),
});
process.stdout.write(`Test payments on ${fake.url}\n`);

let isStopping = false;
function stop(): void {
  if (isStopping) return;
  isStopping = true;
  void fake.close().then(() => process.exit(0));
}
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
