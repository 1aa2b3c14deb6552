/** One field of a refused request; `pointer` is a JSON pointer into what was sent. */
export type FieldProblem = { pointer: string; code: string; message: string };

type ProblemBody = { title?: string; detail?: string; code?: string; errors?: FieldProblem[] };

/** The server answered and refused: the body is a problem document (RFC 9457). */
export class ApiProblem extends Error {
  readonly status: number;
  readonly code: string;
  readonly detail: string;
  readonly errors: FieldProblem[];

  constructor(status: number, body: ProblemBody) {
    const detail = body.detail ?? body.title ?? 'The server refused this without saying why.';
    super(detail);
    this.name = 'ApiProblem';
    this.status = status;
    this.code = body.code ?? 'unknown';
    this.detail = detail;
    this.errors = body.errors ?? [];
  }
}

/** No answer came: the request may or may not have reached the server. */
export class OfflineError extends Error {
  constructor(cause?: unknown) {
    super('No answer from Scruple. Check your connection; nothing you typed is lost.', { cause });
    this.name = 'OfflineError';
  }
}

export type UnsafeMethod = 'POST' | 'PUT' | 'PATCH' | 'DELETE';

type RequestOptions = { signal?: AbortSignal };
type SendOptions = RequestOptions & { method?: UnsafeMethod; body?: unknown; idempotencyKey?: string };

const SESSION_URL = '/api/v1/session';
const CSRF_REFUSED = 'csrf-token-invalid';
let csrfToken: string | null = null;

/** Called wherever a session was read: signing in or out replaces the token. */
export function rememberCsrfToken(token: string | null): void {
  csrfToken = token;
}

async function currentCsrfToken(): Promise<string> {
  if (csrfToken === null) csrfToken = (await apiGet<{ csrfToken: string }>(SESSION_URL)).csrfToken;
  return csrfToken;
}

/** A key for one intended act; keep it while the act is retried, take a new one for a new act. */
export function newIdempotencyKey(): string {
  // randomUUID is missing on plain http outside localhost.
  if (typeof crypto.randomUUID === 'function') return crypto.randomUUID();
  return Array.from(crypto.getRandomValues(new Uint8Array(16)), (byte) =>
    byte.toString(16).padStart(2, '0'),
  ).join('');
}

function parseBody(text: string, contentType: string | null): unknown {
  if (text === '' || !contentType?.includes('json')) return null;
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return null;
  }
}

function toProblem(status: number, body: unknown): ApiProblem {
  return new ApiProblem(status, typeof body === 'object' && body !== null ? body : {});
}

async function request(url: string, init: RequestInit): Promise<unknown> {
  let response: Response;
  let text: string;
  try {
    response = await fetch(url, { ...init, credentials: 'same-origin' });
    text = await response.text();
  } catch (error) {
    if (init.signal?.aborted) throw error;
    throw new OfflineError(error);
  }
  const body = parseBody(text, response.headers.get('content-type'));
  if (!response.ok) throw toProblem(response.status, body);
  return body;
}

/** Reads; the type is the caller's claim about the published response. */
export async function apiGet<T>(url: string, options: RequestOptions = {}): Promise<T> {
  return (await request(url, { headers: { Accept: 'application/json' }, signal: options.signal })) as T;
}

async function withCsrf<T>(send: (token: string) => Promise<T>): Promise<T> {
  const hadToken = csrfToken !== null;
  try {
    return await send(await currentCsrfToken());
  } catch (error) {
    // Another tab may have signed in or out since: take the new token once.
    if (!hadToken || !(error instanceof ApiProblem) || error.code !== CSRF_REFUSED) throw error;
    csrfToken = null;
    return send(await currentCsrfToken());
  }
}

/** Writes as JSON with the CSRF token; POST unless told otherwise. */
export async function apiSend<T>(url: string, options: SendOptions = {}): Promise<T> {
  const { method = 'POST', body, idempotencyKey, signal } = options;
  return withCsrf(async (token) => {
    const headers: Record<string, string> = { Accept: 'application/json', 'X-CSRF-Token': token };
    if (body !== undefined) headers['Content-Type'] = 'application/json';
    if (idempotencyKey) headers['Idempotency-Key'] = idempotencyKey;
    const payload = body === undefined ? undefined : JSON.stringify(body);
    return (await request(url, { method, headers, body: payload, signal })) as T;
  });
}

export type UploadOptions = SendOptions & { body: FormData; onProgress?: (sentShare: number) => void };

function upload(url: string, token: string, options: UploadOptions): Promise<unknown> {
  return new Promise((resolve, reject) => {
    // fetch cannot tell how much of a body has been sent.
    const xhr = new XMLHttpRequest();
    xhr.open(options.method ?? 'POST', url);
    xhr.setRequestHeader('Accept', 'application/json');
    xhr.setRequestHeader('X-CSRF-Token', token);
    if (options.idempotencyKey) xhr.setRequestHeader('Idempotency-Key', options.idempotencyKey);
    xhr.upload.onprogress = (event) => {
      if (event.lengthComputable && event.total > 0) options.onProgress?.(event.loaded / event.total);
    };
    xhr.onload = () => {
      const body = parseBody(xhr.responseText, xhr.getResponseHeader('content-type'));
      if (xhr.status >= 200 && xhr.status < 300) resolve(body);
      else reject(toProblem(xhr.status, body));
    };
    xhr.onerror = () => reject(new OfflineError());
    xhr.onabort = () => reject(new DOMException('The upload was stopped.', 'AbortError'));
    if (options.signal?.aborted) return reject(new DOMException('The upload was stopped.', 'AbortError'));
    options.signal?.addEventListener('abort', () => xhr.abort(), { once: true });
    xhr.send(options.body);
  });
}

/** Sends files; `onProgress` gets the share sent, 0 to 1. Refusals and lost connections as in `apiSend`. */
export async function apiUpload<T>(url: string, options: UploadOptions): Promise<T> {
  return withCsrf(async (token) => (await upload(url, token, options)) as T);
}
