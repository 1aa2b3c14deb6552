import express, { type RequestHandler } from 'express';
import supertest from 'supertest';
import { describe, expect, it } from 'vitest';
import { RATE_LIMITS } from '#shared/limits.ts';
import { env } from '#server/env.ts';
import { errorHandler } from '#server/middleware/error-handler.ts';
import { rateLimited } from '#server/middleware/rate-limit.ts';

const app = express();
app.use(express.json());
const RIGHT = 'the-right-password';
const answer: RequestHandler = (req, res) => {
  res.status((req.body as { password?: string }).password === RIGHT ? 200 : 401).json({});
};
app.post('/sign-in', rateLimited('sign-in'), answer);
app.post('/any-account', rateLimited('sign-in-address'), answer);
app.use(errorHandler);
const allowed = RATE_LIMITS['sign-in'].requestsMax * env.RATE_LIMIT_FACTOR;
const tryIt = (email: string, password = 'wrong') =>
  supertest(app).post('/sign-in').send({ email, password });

describe('the limit on sign-in', () => {
  it('lets so many tries through and then answers 429 with a problem document, for that account alone', async () => {
    for (let index = 0; index < allowed; index += 1) await tryIt('ilse@scruple.example').expect(401);
    const refused = await tryIt('ILSE@scruple.example');
    expect(refused.status).toBe(429);
    expect(refused.body).toMatchObject({ code: 'too-many-requests', status: 429 });
    expect(Number.parseInt(String(refused.headers['retry-after']), 10)).toBeGreaterThan(0);
    await tryIt('other@scruple.example').expect(401);
    // Even the right password waits then.
    await tryIt('ilse@scruple.example', RIGHT).expect(429);
  }, 60_000);

  it('counts no sign-in that succeeds', async () => {
    for (let index = 0; index < allowed + 5; index += 1)
      await tryIt('ada@scruple.example', RIGHT).expect(200);
    await tryIt('ada@scruple.example').expect(401);
  }, 60_000);

  it('counts the tries of an address at many accounts as well', async () => {
    const most = RATE_LIMITS['sign-in-address'].requestsMax * env.RATE_LIMIT_FACTOR;
    const attempt = (index: number) =>
      supertest(app)
        .post('/any-account')
        .send({ email: `${index}@scruple.example` });
    for (let done = 0; done < most; done += 50) {
      const some = Array.from({ length: Math.min(50, most - done) }, (_, index) => attempt(done + index));
      const answers = await Promise.all(some);
      expect(answers.every(({ status }) => status === 401)).toBe(true);
    }
    const refused = await attempt(most);
    expect([refused.status, refused.body.code]).toEqual([429, 'too-many-requests']);
  }, 120_000);
});
