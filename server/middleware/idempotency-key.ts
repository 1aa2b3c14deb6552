import { createHash } from 'node:crypto';
import type { RequestHandler } from 'express';
import { AppError } from '#server/app-error.ts';
import type { Actor, IdempotencyTicket, RouteDefinition } from '#server/routing/define-route.ts';

const KEY_SHAPE = /^[\x21-\x7e]{8,255}$/;

/** Reads the header and fingerprints the input; the look-up itself happens inside the command's transaction. */
export function readIdempotencyKey(route: RouteDefinition): RequestHandler {
  return (req, res, next) => {
    const key = req.get('idempotency-key');
    if (key === undefined || !KEY_SHAPE.test(key)) throw new AppError('idempotency-key-required');
    const input = JSON.stringify([req.params, res.locals.input.body ?? null]);
    const ticket: IdempotencyTicket = {
      actorId: (req.user as Actor).id,
      operation: `${route.method} ${route.path}`,
      key,
      inputHash: createHash('sha256').update(input).digest('hex'),
    };
    res.locals.idempotency = ticket;
    next();
  };
}
