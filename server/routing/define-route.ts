import type { Request, RequestHandler, Response } from 'express';
import type { z } from 'zod';
import type { RateLimitName } from '#shared/limits.ts';
import type { Role } from '#shared/roles.ts';

/**
 * Who may call a route at all. `public` is said aloud; `signed` marks a webhook whose signature is its access.
 * What a caller may do to a *row* is the policy's business.
 */
export type Access = 'public' | 'signed' | 'member' | 'desk' | 'lab' | 'admin';

export type Actor = {
  id: string;
  role: Role;
  displayName: string;
  email: string;
  timeZone: string;
  region: string;
  suspendedAt: Date | null;
};

export type IdempotencyTicket = { actorId: string; operation: string; key: string; inputHash: string };

export type RouteContext<P, Q, B> = {
  params: P;
  query: Q;
  body: B;
  req: Request;
  res: Response;
  /** The signed-in member, or null on a public route called without a session. */
  viewer: Actor | null;
  /** The signed-in member of a route that is not public; throws where there is none. */
  actor: Actor;
  /** Present on routes that move money. */
  idempotency: IdempotencyTicket | null;
};

export type RouteDefinition<P = unknown, Q = unknown, B = unknown> = {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  summary: string;
  access: Access;
  limit: RateLimitName;
  /** True where the call moves money: the Idempotency-Key header is then required. */
  movesMoney?: boolean;
  /**
   * True for what a suspended member may still do beside reading: leave, and bring deals that were paid before to their end,
   * since the other side relies on it.
   */
  whileSuspended?: boolean;
  /** Only for signed webhooks and public calculations. */
  csrf?: 'exempt';
  params?: z.ZodType<P>;
  query?: z.ZodType<Q>;
  body?: z.ZodType<B>;
  answer?: z.ZodType;
  /** Express handlers that must see the request before it is parsed: uploads, raw bodies. */
  before?: readonly RequestHandler[];
  handle: (context: RouteContext<P, Q, B>) => Promise<void> | void;
};

/** Keeps the three input types together; the registry stores them erased. */
export function defineRoute<P = unknown, Q = unknown, B = unknown>(
  definition: RouteDefinition<P, Q, B>,
): RouteDefinition {
  return definition as unknown as RouteDefinition;
}
