import type { RequestHandler } from 'express';
import helmet from 'helmet';
import { env } from '#server/env.ts';

const isSecure = env.PUBLIC_URL.startsWith('https://');

/**
 * Nothing from other hosts, no inline script, no eval. Inline *styles* stay allowed because positions in drawings are
 * computed; `blob:` shows a photo before it is uploaded.
 */
export const securityHeaders: RequestHandler = helmet({
  contentSecurityPolicy: {
    useDefaults: false,
    directives: {
      defaultSrc: ["'self'"],
      baseUri: ["'none'"],
      objectSrc: ["'self'"],
      scriptSrc: ["'self'"],
      styleSrc: ["'self'", "'unsafe-inline'"],
      imgSrc: ["'self'", 'blob:', 'data:'],
      fontSrc: ["'self'"],
      connectSrc: ["'self'"],
      frameSrc: ["'self'"],
      frameAncestors: ["'none'"],
      formAction: ["'self'"],
      ...(isSecure ? { upgradeInsecureRequests: [] } : {}),
    },
  },
  strictTransportSecurity: isSecure ? { maxAge: 31_536_000, includeSubDomains: true } : false,
  crossOriginEmbedderPolicy: false,
  referrerPolicy: { policy: 'same-origin' },
});
