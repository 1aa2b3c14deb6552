import { pino } from 'pino';
import { env } from '#server/env.ts';

/** One JSON line an entry, UTC. Cookies, tokens and passwords never reach it. */
export const logger = pino({
  level: env.LOG_LEVEL,
  timestamp: pino.stdTimeFunctions.isoTime,
  redact: {
    paths: [
      'req.headers.cookie',
      'req.headers.authorization',
      'req.headers["x-csrf-token"]',
      'req.headers["stripe-signature"]',
      'res.headers["set-cookie"]',
    ],
    remove: true,
  },
});
