import { http, HttpResponse } from 'msw';
import { beforeEach, describe, expect, it } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import {
  apiGet,
  ApiProblem,
  apiSend,
  apiUpload,
  newIdempotencyKey,
  OfflineError,
  rememberCsrfToken,
} from './api-client.ts';

const session = (token: string) =>
  http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: token, member: null }));

function problem(status: number, body: object) {
  return HttpResponse.json(body, { status, headers: { 'content-type': 'application/problem+json' } });
}

async function refusal(promise: Promise<unknown>): Promise<ApiProblem> {
  const error: unknown = await promise.then(
    () => null,
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(ApiProblem);
  return error as ApiProblem;
}

beforeEach(() => rememberCsrfToken(null));

describe('apiGet', () => {
  it('answers the body', async () => {
    apiServer.use(http.get('/api/v1/lots', () => HttpResponse.json({ lots: [] })));
    expect(await apiGet('/api/v1/lots')).toEqual({ lots: [] });
  });

  it('turns a problem document into an ApiProblem with every field error', async () => {
    const errors = [{ pointer: '/gross/value', code: 'too-small', message: 'Type a number above zero' }];
    apiServer.use(
      http.get('/api/v1/lots', () =>
        problem(422, { code: 'invalid-input', title: 'T', detail: 'Look again', errors }),
      ),
    );
    const error = await refusal(apiGet('/api/v1/lots'));
    expect(error).toMatchObject({ status: 422, code: 'invalid-input', detail: 'Look again', errors });
  });

  it('keeps the status of an answer that is no problem document', async () => {
    apiServer.use(http.get('/api/v1/lots', () => new HttpResponse('<h1>Bad gateway</h1>', { status: 502 })));
    expect(await refusal(apiGet('/api/v1/lots'))).toMatchObject({ status: 502, code: 'unknown', errors: [] });
  });

  it('tells a lost connection apart from a refusal', async () => {
    apiServer.use(http.get('/api/v1/lots', () => HttpResponse.error()));
    await expect(apiGet('/api/v1/lots')).rejects.toBeInstanceOf(OfflineError);
  });

  it('stays an abort when it was aborted', async () => {
    apiServer.use(http.get('/api/v1/lots', () => HttpResponse.json({})));
    await expect(apiGet('/api/v1/lots', { signal: AbortSignal.abort() })).rejects.toMatchObject({
      name: 'AbortError',
    });
  });
});

describe('apiSend', () => {
  it('fetches the CSRF token once and sends it with the body and the idempotency key', async () => {
    let sessionsRead = 0;
    const seen: unknown[] = [];
    apiServer.use(
      http.get('/api/v1/session', () => {
        sessionsRead += 1;
        return HttpResponse.json({ csrfToken: 'first', member: null });
      }),
      http.put('/api/v1/lots/1', async ({ request }) => {
        const { headers } = request;
        seen.push([
          headers.get('x-csrf-token'),
          headers.get('idempotency-key'),
          headers.get('content-type'),
          await request.json(),
        ]);
        return new HttpResponse(null, { status: 204 });
      }),
    );
    const options = { method: 'PUT', body: { price: '4093.35' }, idempotencyKey: 'k1' } as const;
    expect(await apiSend('/api/v1/lots/1', options)).toBeNull();
    await apiSend('/api/v1/lots/1', options);
    expect(seen).toEqual(Array(2).fill(['first', 'k1', 'application/json', { price: '4093.35' }]));
    expect(sessionsRead).toBe(1);
  });

  it('takes a new token once when the remembered one has become stale', async () => {
    rememberCsrfToken('stale');
    const tokens: (string | null)[] = [];
    apiServer.use(
      session('new'),
      http.post('/api/v1/deals', ({ request }) => {
        tokens.push(request.headers.get('x-csrf-token'));
        return tokens.length === 1
          ? problem(403, { code: 'csrf-token-invalid' })
          : HttpResponse.json({ code: 'D-1' });
      }),
    );
    expect(await apiSend('/api/v1/deals')).toEqual({ code: 'D-1' });
    expect(tokens).toEqual(['stale', 'new']);
  });

  it('does not repeat a write that was refused for another reason', async () => {
    rememberCsrfToken('t');
    let tries = 0;
    apiServer.use(
      http.post('/api/v1/deals', () => {
        tries += 1;
        return problem(409, { code: 'lot-taken', detail: 'Another buyer was first' });
      }),
    );
    expect((await refusal(apiSend('/api/v1/deals'))).code).toBe('lot-taken');
    expect(tries).toBe(1);
  });

  it('makes keys that differ', () => {
    expect(new Set(Array.from({ length: 50 }, newIdempotencyKey)).size).toBe(50);
  });
});

describe('apiUpload', () => {
  const form = () => {
    const data = new FormData();
    data.append('photo', new File(['x'.repeat(2_000)], 'button.jpg', { type: 'image/jpeg' }));
    return data;
  };

  it('sends the token and answers the body', async () => {
    rememberCsrfToken('t');
    let token: string | null = null;
    apiServer.use(
      http.post('/api/v1/lots/1/photos', ({ request }) => {
        token = request.headers.get('x-csrf-token');
        return HttpResponse.json({ id: 'p1' }, { status: 201 });
      }),
    );
    expect(await apiUpload('/api/v1/lots/1/photos', { body: form() })).toEqual({ id: 'p1' });
    expect(token).toBe('t');
  });

  it('is refused with the reason', async () => {
    rememberCsrfToken('t');
    apiServer.use(http.post('/api/v1/lots/1/photos', () => problem(415, { code: 'photo-not-an-image' })));
    expect(await refusal(apiUpload('/api/v1/lots/1/photos', { body: form() }))).toMatchObject({
      status: 415,
      code: 'photo-not-an-image',
    });
  });
});
