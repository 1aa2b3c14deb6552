import { randomBytes } from 'node:crypto';
import { readJson, writeJson } from './files.mjs';
import { inData } from './paths.mjs';

const makers = {
  databaseOwnerPassword: () => random(24),
  databaseAppPassword: () => random(24),
  sessionSecret: () => random(48),
  stripeSecretKey: () => `sk_test_${random(24)}`,
  stripeWebhookSecret: () => `whsec_${random(24)}`,
  quotesApiKey: () => random(24),
  carrierApiKey: () => random(24),
};

/** The secrets of this data folder, made on the first start and readable by their owner alone. */
export function loadSecrets() {
  const file = inData('secrets.json');
  const stored = readJson(file) ?? {};
  const secrets = {};
  for (const [name, make] of Object.entries(makers)) {
    secrets[name] = typeof stored[name] === 'string' && stored[name] ? stored[name] : make();
  }
  if (JSON.stringify(stored) !== JSON.stringify(secrets)) writeJson(file, secrets);
  return secrets;
}

function random(bytes) {
  return randomBytes(bytes).toString('hex');
}
