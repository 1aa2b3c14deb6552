import { z } from 'zod';

export type HostedFailureReason = 'unreachable' | 'timeout' | 'status' | 'garbage';

/** A hosted service failed us; `reason` says how, `status` its HTTP status where it answered. */
export class HostedServiceError extends Error {
  readonly reason: HostedFailureReason;
  readonly status: number | null;
  constructor(
    reason: HostedFailureReason,
    message: string,
    options: { status?: number; cause?: unknown } = {},
  ) {
    super(message, { cause: options.cause });
    this.name = new.target.name;
    this.reason = reason;
    this.status = options.status ?? null;
  }
}

export type HostedCall = {
  url: URL;
  apiKey: string;
  timeoutMs: number;
  body?: unknown;
  /** Makes the service's own error class. */
  fail: (...args: ConstructorParameters<typeof HostedServiceError>) => HostedServiceError;
};

const bytesMax = 2_000_000;

async function readLimited(response: Response): Promise<string> {
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of response.body ?? []) {
    size += chunk.byteLength;
    if (size > bytesMax) throw new RangeError(`answer larger than ${bytesMax} bytes`);
    chunks.push(chunk);
  }
  return Buffer.concat(chunks).toString('utf8');
}

/**
 * One JSON exchange with a hosted service: POST when a body is given, else GET. The time limit covers the whole
 * answer. Redirects are refused, so that the key never travels to another host.
 */
export async function callHostedJson({ url, apiKey, timeoutMs, body, fail }: HostedCall): Promise<unknown> {
  let text: string;
  try {
    const response = await fetch(url, {
      method: body === undefined ? 'GET' : 'POST',
      headers: {
        accept: 'application/json',
        authorization: `Bearer ${apiKey}`,
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
      },
      body: body === undefined ? null : JSON.stringify(body),
      redirect: 'error',
      signal: AbortSignal.timeout(timeoutMs),
    });
    if (!response.ok) {
      await response.body?.cancel();
      throw fail('status', `the service answered ${response.status}`, { status: response.status });
    }
    text = await readLimited(response);
  } catch (error) {
    if (error instanceof HostedServiceError) throw error;
    if (error instanceof RangeError) throw fail('garbage', error.message, { cause: error });
    const isTimeout = error instanceof DOMException && error.name === 'TimeoutError';
    const message = isTimeout ? `no answer within ${timeoutMs} ms` : 'the service cannot be reached';
    throw fail(isTimeout ? 'timeout' : 'unreachable', message, { cause: error });
  }
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    throw fail('garbage', 'the answer is not JSON', { cause: error });
  }
}

export function parseHosted<T>(schema: z.ZodType<T>, answer: unknown, fail: HostedCall['fail']): T {
  const result = schema.safeParse(answer);
  if (result.success) return result.data;
  throw fail('garbage', `the answer is not as agreed: ${z.prettifyError(result.error)}`, {
    cause: result.error,
  });
}

/** Resolves below the configured address, whether or not that ends in a slash. */
export function hostedUrl(base: string, path: string, query: Record<string, string> = {}): URL {
  const url = new URL(`${base.replace(/\/+$/, '')}/${path}`);
  for (const [name, value] of Object.entries(query)) url.searchParams.set(name, value);
  return url;
}
