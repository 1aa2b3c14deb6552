import { z } from 'zod';
import type { Request, Response } from 'express';
import { ApiError } from './errors.ts';
import type { ErrorBody } from './errors.ts';
import type { Fake } from './fake.ts';

/**
 * A fault of the next calls. `before`: nothing is executed. `after`: executed and saved under its key, only the
 * answer is lost. `saved`: nothing executed, and the error itself is saved under the key.
 */
export const faultInput = z.strictObject({
  method: z.enum(['GET', 'POST', '*']).default('*'),
  /** A path; `*` stands for any run of characters. */
  path: z.string().default('*'),
  count: z.int().min(1).max(1000).default(1),
  kind: z.enum(['500', '409', '429', '402', 'reset', 'hang', 'html', 'delay']),
  stage: z.enum(['before', 'after', 'saved']).default('before'),
  delayMs: z.int().min(0).max(600_000).default(1000),
});
export type Fault = z.output<typeof faultInput>;

function matches(fault: Fault, method: string, path: string): boolean {
  if (fault.method !== '*' && fault.method !== method) return false;
  const pattern = fault.path
    .split('*')
    .map((part) => part.replace(/[.?+^$()[\]{}|\\]/g, '\\$&'))
    .join('.*');
  return new RegExp(`^${pattern}$`).test(path);
}

export function takeFault(fake: Fake, method: string, path: string): Fault | null {
  const fault = fake.faults.find((candidate) => matches(candidate, method, path));
  if (!fault) return null;
  fault.count -= 1;
  if (fault.count === 0) fake.faults.splice(fake.faults.indexOf(fault), 1);
  return fault;
}

const errorAnswers: Record<'500' | '409' | '429' | '402', { status: number; body: ErrorBody }> = {
  '500': { status: 500, body: { type: 'api_error', message: 'An unknown error occurred.' } },
  '409': {
    status: 409,
    body: {
      type: 'invalid_request_error',
      code: 'lock_timeout',
      message: 'This object is in use. Try again.',
    },
  },
  '429': {
    status: 429,
    body: { type: 'rate_limit_error', code: 'rate_limit', message: 'Too many requests. Slow down.' },
  },
  '402': {
    status: 402,
    body: {
      type: 'card_error',
      code: 'card_declined',
      decline_code: 'generic_decline',
      message: 'Your card was declined.',
    },
  },
};

/** The fault as an API error, for the kinds that are one. */
export function faultError(fault: Fault): ApiError | null {
  if (!(fault.kind in errorAnswers)) return null;
  const { status, body } = errorAnswers[fault.kind as keyof typeof errorAnswers];
  return new ApiError(status, body, fault.stage === 'saved');
}

/** Breaks the answer on the wire; true when it is done and nothing else may be sent. */
export function breakAnswer(fault: Fault, request: Request, response: Response): boolean {
  switch (fault.kind) {
    case 'reset':
      request.socket.resetAndDestroy();
      return true;
    case 'hang':
      return true;
    case 'html':
      response.status(502).type('html').send('<html><body><h1>502 Bad Gateway</h1></body></html>');
      return true;
    default:
      return false;
  }
}
