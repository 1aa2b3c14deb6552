import type { Express, RequestHandler } from 'express';
import { AppError, ForbiddenError, invariant } from '#server/app-error.ts';
import { readIdempotencyKey } from '#server/middleware/idempotency-key.ts';
import { rateLimited } from '#server/middleware/rate-limit.ts';
import { requireCsrfToken } from '#server/middleware/csrf.ts';
import { validate } from '#server/middleware/validate.ts';
import type { Access, Actor, IdempotencyTicket, RouteDefinition } from './define-route.ts';

const GRANTED: Readonly<Record<Access, readonly string[] | null>> = {
  public: null,
  signed: null,
  member: ['member', 'desk', 'lab', 'admin'],
  desk: ['desk', 'admin'],
  lab: ['lab'],
  admin: ['admin'],
};

function requireAccess({ access, whileSuspended = false }: RouteDefinition): RequestHandler {
  const roles = GRANTED[access];
  return (req, _res, next) => {
    if (roles === null) return next();
    const actor = req.user as Actor | undefined;
    if (actor === undefined) throw new AppError('sign-in-required');
    if (!roles.includes(actor.role)) throw new ForbiddenError();
    if (actor.suspendedAt !== null && req.method !== 'GET' && !whileSuspended) {
      throw new ForbiddenError('member-suspended');
    }
    next();
  };
}

function handlerOf(route: RouteDefinition): RequestHandler {
  return (req, res) => {
    const input = res.locals.input as { params: unknown; query: unknown; body: unknown };
    const viewer = (req.user as Actor | undefined) ?? null;
    return route.handle({
      ...input,
      req,
      res,
      viewer,
      get actor(): Actor {
        invariant(viewer !== null, 'a public route asked for its actor');
        return viewer;
      },
      idempotency: (res.locals.idempotency as IdempotencyTicket | undefined) ?? null,
    });
  };
}

/** Every route reads as one list: access → rate limit → CSRF → upload or raw body → validation → idempotency key → handler. */
export function mountRoutes(app: Express, routes: readonly RouteDefinition[]): void {
  for (const route of routes) {
    const chain: RequestHandler[] = [requireAccess(route), rateLimited(route.limit)];
    if (route.limit === 'sign-in') chain.push(rateLimited('sign-in-address'));
    if (route.method !== 'get' && route.csrf !== 'exempt') chain.push(requireCsrfToken);
    chain.push(...(route.before ?? []), validate(route));
    if (route.movesMoney === true) chain.push(readIdempotencyKey(route));
    app[route.method](route.path, ...chain, handlerOf(route));
  }
}
