import { z } from 'zod';
import { resourceMissing } from './errors.ts';
import { lookUp, ownerOf, platform } from './fake.ts';
import type { Fake } from './fake.ts';
import type { Kind, Kinds } from './state.ts';

/** One request after authentication and input checks. `owner` is the account it acts for. */
export interface Call<I> {
  fake: Fake;
  owner: string;
  path: Record<string, string>;
  input: I;
  /** Told in the events that this request causes. */
  request: { id: string; idempotency_key: string | null };
}

export interface Endpoint {
  method: 'GET' | 'POST';
  path: string;
  input: z.ZodType;
  run(call: Call<never>): unknown;
}

/** Ties a handler's input type to its schema. Handlers are synchronous, so each is atomic. */
export function endpoint<S extends z.ZodRawShape>(
  method: Endpoint['method'],
  path: string,
  shape: S,
  run: (call: Call<z.output<z.ZodObject<S>>>) => unknown,
): Endpoint {
  const input = z.strictObject({ ...shape, expand: z.array(z.string()).max(20).optional() });
  return { method, path, input, run: run as Endpoint['run'] };
}

const nouns: Partial<Record<Kind, string>> = { 'checkout.session': 'checkout session' };

/** Finds an object that the calling account may see, or answers 404. */
export function find<K extends Kind>(call: Call<unknown>, kind: K, id: string, param = 'id'): Kinds[K] {
  const value = lookUp(call.fake, kind, id);
  if (!value || ownerOf(call.fake, id) !== call.owner) {
    throw resourceMissing(nouns[kind] ?? kind.replaceAll('_', ' '), id, param, param === 'id' ? 404 : 400);
  }
  return value;
}

export function pathId(call: Call<unknown>, name = 'id'): string {
  return call.path[name] ?? '';
}

/** Accounts belong to the platform, but an account acting for itself sees itself. */
export function findAccount(call: Call<unknown>, id: string, param = 'id'): Kinds['account'] {
  const value = lookUp(call.fake, 'account', id);
  if (!value || (call.owner !== platform && call.owner !== id)) {
    throw resourceMissing('account', id, param, param === 'id' ? 404 : 400);
  }
  return value;
}
