import { randomBytes, timingSafeEqual } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import 'express-session';
import { ForbiddenError } from '#server/app-error.ts';
import { env } from '#server/env.ts';

declare module 'express-session' {
  interface SessionData {
    csrfToken?: string;
    signedInAt?: string;
  }
}

/** The session's own token; made on first need. The page sends it back in `X-CSRF-Token`. */
export function csrfTokenOf(req: Request): string {
  req.session.csrfToken ??= randomBytes(24).toString('base64url');
  return req.session.csrfToken;
}

function isSame(left: string, right: string): boolean {
  const a = Buffer.from(left);
  const b = Buffer.from(right);
  return a.length === b.length && timingSafeEqual(a, b);
}

/** Synchroniser token, with the browser's own word on the request's origin as a second layer. */
export const requireCsrfToken: RequestHandler = (req, _res, next) => {
  const site = req.get('sec-fetch-site');
  if (site !== undefined && site !== 'same-origin' && site !== 'none')
    throw new ForbiddenError('csrf-token-invalid');
  const origin = req.get('origin');
  if (
    origin !== undefined &&
    origin !== new URL(env.PUBLIC_URL).origin &&
    origin !== `${req.protocol}://${req.get('host') ?? ''}`
  ) {
    throw new ForbiddenError('csrf-token-invalid');
  }
  const expected = req.session.csrfToken;
  const given = req.get('x-csrf-token');
  if (expected === undefined || given === undefined || !isSame(expected, given)) {
    throw new ForbiddenError('csrf-token-invalid');
  }
  next();
};
