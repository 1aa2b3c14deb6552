import { setTimeout as sleep } from 'node:timers/promises';
import express from 'express';
import type { Request, Response, Router } from 'express';
import type { Call, Endpoint } from './endpoint.ts';
import { ApiError, invalidRequest, unauthorized } from './errors.ts';
import { expandAnswer } from './expand.ts';
import { lookUp, newId, platform } from './fake.ts';
import type { Fake } from './fake.ts';
import { breakAnswer, faultError, takeFault } from './faults.ts';
import type { Fault } from './faults.ts';
import { parseForm } from './form-parser.ts';
import { claimKey, fingerprint } from './idempotency.ts';
import type { Claim } from './idempotency.ts';
import { readInput } from './input.ts';

function authenticate(fake: Fake, request: Request): string {
  const [scheme, key] = (request.get('authorization') ?? '').split(' ');
  if (scheme !== 'Bearer' || !key) throw unauthorized('You did not provide an API key.');
  if (!/^sk_test_\w+$/.test(key)) throw unauthorized('Invalid API Key provided.');
  const account = request.get('stripe-account');
  if (account === undefined) return platform;
  if (!lookUp(fake, 'account', account)) {
    throw new ApiError(
      403,
      {
        type: 'invalid_request_error',
        code: 'account_invalid',
        message: `The provided key does not have access to account '${account}'.`,
      },
      false,
    );
  }
  return account;
}

/** The request has been carried out by now, so a wish that cannot be met burns the key like any late refusal. */
function expanded(call: Call<unknown>, result: unknown): unknown {
  try {
    return expandAnswer(call.fake, result, (call.input as { expand?: string[] }).expand ?? []);
  } catch (error) {
    if (error instanceof ApiError) throw new ApiError(error.status, error.body, true);
    throw error;
  }
}

async function execute(route: Endpoint, call: Call<unknown>, fault: Fault | null, claim: Claim | null) {
  if (fault?.kind === 'delay') await sleep(fault.delayMs);
  const early = fault && fault.stage !== 'after' ? faultError(fault) : null;
  if (early) throw early;
  const result = route.run(call as Call<never>);
  // The answer is kept as it was sent, expansion included, so that a replay is the same to the byte.
  const body = expanded(call, result);
  claim?.finish(200, body);
  return body;
}

function sendError(response: Response, error: unknown): void {
  if (error instanceof ApiError) {
    response.status(error.status).json({ error: error.body });
    return;
  }
  process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
  response.status(500).json({ error: { type: 'api_error', message: 'The stand-in itself failed.' } });
}

async function answer(fake: Fake, route: Endpoint, request: Request, response: Response): Promise<void> {
  const requestId = newId('req', 14);
  response.set('request-id', requestId);
  let claim: Claim | null = null;
  const fault = takeFault(fake, request.method, request.path);
  try {
    const owner = authenticate(fake, request);
    const query = request.url.split('?')[1] ?? '';
    const raw = parseForm(request.method === 'GET' ? query : String(request.body ?? ''));
    const key = request.get('idempotency-key') ?? null;
    if (key !== null && request.method === 'POST') {
      claim = claimKey(fake, owner, key, fingerprint(request.method, request.path, raw));
      response.set('idempotency-key', key);
      if (claim.saved) {
        response.set('idempotent-replayed', 'true').status(claim.saved.status).json(claim.saved.body);
        return;
      }
    }
    const input = readInput(route.input, raw);
    if (fault && fault.stage === 'before' && breakAnswer(fault, request, response)) {
      claim?.drop();
      return;
    }
    const path = request.params as Record<string, string>;
    const call = { fake, owner, path, input, request: { id: requestId, idempotency_key: key } };
    const body = await execute(route, call, fault, claim);
    await fake.store.flushed();
    if (fault?.stage === 'after') {
      const late = faultError(fault);
      if (late) throw late;
      if (breakAnswer(fault, request, response)) return;
    }
    response.status(200).json(body);
  } catch (error) {
    if (error instanceof ApiError && error.saved) claim?.finish(error.status, { error: error.body });
    else claim?.drop();
    await fake.store.flushed();
    sendError(response, error);
  }
}

/** The API itself: each endpoint behind authentication, idempotency, input checks and faults. */
export function apiRouter(fake: Fake, endpoints: Endpoint[]): Router {
  const router = express.Router();
  router.use(express.text({ type: () => true, limit: '256kb', defaultCharset: 'utf-8' }));
  for (const route of endpoints) {
    const method = route.method === 'GET' ? 'get' : 'post';
    router[method](route.path, (request, response) => answer(fake, route, request, response));
  }
  router.use('/v1', (request, response) => {
    const message = `Unrecognized request URL (${request.method}: ${request.originalUrl}).`;
    const known = invalidRequest(message);
    response.status(404).json({ error: known.body });
  });
  return router;
}
