import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import supertest from 'supertest';
import { afterAll, describe, expect, it } from 'vitest';

// The environment is read at the first import of the server.
process.env.PUBLIC_URL = 'https://market.example';
process.env.TRUST_PROXY = '1';
const { createApp } = await import('#server/app.ts');
const { sequelize } = await import('#server/database/connection.ts');

const { app, close } = createApp();
const server = createServer(app);
await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
afterAll(async () => {
  close();
  await new Promise((resolve) => server.close(resolve));
  await sequelize.close();
});

describe('behind https', () => {
  it('binds the cookie to this very host, out of reach of scripts, and asks for https for a year', async () => {
    const answer = await supertest(url).get('/api/v1/session').set('X-Forwarded-Proto', 'https').expect(200);
    const cookie = String(answer.headers['set-cookie']?.[0]);
    expect(cookie).toMatch(/^__Host-scruple=/);
    expect(cookie).toContain('; Secure');
    expect(cookie).toContain('; HttpOnly');
    expect(cookie).toContain('; SameSite=Lax');
    expect(cookie).toContain('; Path=/');
    expect(cookie).not.toMatch(/Domain=/i);
    expect(answer.headers['strict-transport-security']).toBe('max-age=31536000; includeSubDomains');
  });

  it('gives no cookie over plain http', async () => {
    const answer = await supertest(url).get('/api/v1/session').expect(200);
    expect(answer.headers['set-cookie']).toBeUndefined();
  });
});
