import { randomUUID } from 'node:crypto';
import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import multer from 'multer';
import { ERROR_CODES, type ErrorCode } from '#shared/error-codes.ts';
import { AppError, NotFoundError, type FieldError } from '#server/app-error.ts';
import { isDatabaseUnreachable } from '#server/database/driver-error.ts';
import { logger } from '#server/logger.ts';

/** An RFC 9457 problem document; `code` is the stable name, `errors` name the fields. */
export function sendProblem(
  res: Response,
  code: ErrorCode,
  detail?: string,
  errors: readonly FieldError[] = [],
  instance?: string,
): void {
  const { status, title } = ERROR_CODES[code];
  if (status === 503 || status === 429) res.set('Retry-After', res.get('Retry-After') ?? '5');
  res
    .status(status)
    .type('application/problem+json')
    .send(
      JSON.stringify({
        type: `/problems/${code}`,
        title,
        status,
        detail: detail ?? title,
        code,
        ...(errors.length > 0 ? { errors } : {}),
        ...(instance === undefined ? {} : { instance }),
      }),
    );
}

export const nothingHere: RequestHandler = () => {
  throw new NotFoundError();
};

const CODE_OF_STATUS: Readonly<Record<number, ErrorCode>> = {
  404: 'not-found',
  413: 'request-too-large',
  415: 'media-type-unsupported',
};

function knownRefusal(
  error: unknown,
): { code: ErrorCode; detail?: string; errors?: readonly FieldError[] } | null {
  if (error instanceof AppError) return { code: error.code, detail: error.message, errors: error.errors };
  if (error instanceof multer.MulterError) {
    return error.code === 'LIMIT_FILE_SIZE' ? { code: 'photo-too-large' } : { code: 'malformed-request' };
  }
  if (isDatabaseUnreachable(error)) return { code: 'service-unavailable' };
  if (error instanceof URIError) return { code: 'malformed-request' };
  // The body parser and the file server refuse with an HTTP status of their own.
  const { status } = error as { status?: unknown };
  if (typeof status !== 'number' || status < 400 || status >= 500) return null;
  return { code: CODE_OF_STATUS[status] ?? 'malformed-request' };
}

/** The caller went away while an answer was on its way: there is nobody to tell, and nothing is wrong. */
function hasCallerLeft(error: unknown, res: Response): boolean {
  return (error as { code?: unknown }).code === 'ERR_STREAM_PREMATURE_CLOSE' && res.destroyed;
}

/** The one place where errors become answers. What is not a known refusal is logged under a random id and told as nothing more. */
export const errorHandler: ErrorRequestHandler = (error, req, res, next) => {
  if (hasCallerLeft(error, res)) return;
  if (res.headersSent) return next(error);
  const refusal = knownRefusal(error);
  if (refusal !== null) {
    if (refusal.code === 'service-unavailable')
      logger.warn({ err: error as Error, url: req.originalUrl }, 'database unreachable');
    return sendProblem(res, refusal.code, refusal.detail, refusal.errors);
  }
  const id = randomUUID();
  logger.error({ err: error as Error, id, method: req.method, url: req.originalUrl }, 'unexpected fault');
  sendProblem(res, 'unexpected-fault', `Tell us this number: ${id}`, [], `urn:uuid:${id}`);
};
