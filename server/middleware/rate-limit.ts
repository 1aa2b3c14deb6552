import type { RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { RATE_LIMITS, type RateLimitName } from '#shared/limits.ts';
import { AppError } from '#server/app-error.ts';
import { env } from '#server/env.ts';

/** What is limited here is guessing: whoever signs in has not guessed. */
const FAILURES_ONLY: readonly RateLimitName[] = ['sign-in', 'sign-in-address'];

const handlers = new Map<RateLimitName, RequestHandler>();

/**
 * One counter a limit and a process. Sign-in counts the address and the account together, so that guessing at one account
 * does not lock the others out of the same office; a wider count by address alone stands beside it.
 */
export function rateLimited(name: RateLimitName): RequestHandler {
  const known = handlers.get(name);
  if (known !== undefined) return known;
  const { windowSeconds, requestsMax } = RATE_LIMITS[name];
  const handler = rateLimit({
    windowMs: windowSeconds * 1000,
    limit: requestsMax * env.RATE_LIMIT_FACTOR,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    identifier: name,
    skipSuccessfulRequests: FAILURES_ONLY.includes(name),
    keyGenerator: (req) => {
      const address = ipKeyGenerator(req.ip ?? 'unknown');
      const email: unknown = (req.body as { email?: unknown } | undefined)?.email;
      return name === 'sign-in' && typeof email === 'string' ? `${address}|${email.toLowerCase()}` : address;
    },
    handler: () => {
      throw new AppError('too-many-requests');
    },
  });
  handlers.set(name, handler);
  return handler;
}
