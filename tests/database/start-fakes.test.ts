import { describe, expect, it } from 'vitest';
import { startFakes } from '../setup/start-fakes.ts';

const services = ['STRIPE_API_BASE', 'QUOTES_URL', 'CARRIER_URL'] as const;

function askHealth(service: (typeof services)[number]) {
  return fetch(`${process.env[service]}/control/health`);
}

describe('the stand-ins of a test file', () => {
  it('refuse calls until the test starts them, then answer where the environment says', async () => {
    for (const service of services) await expect(askHealth(service), service).rejects.toThrow('fetch failed');
    const fakes = await startFakes();
    try {
      for (const service of services) expect((await askHealth(service)).status, service).toBe(200);
      expect(fakes.mail.smtpUrl).toBe(process.env.SMTP_URL);
    } finally {
      await fakes.close();
    }
    for (const service of services) await expect(askHealth(service), service).rejects.toThrow('fetch failed');
  });
});
