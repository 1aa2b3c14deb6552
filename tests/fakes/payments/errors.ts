export interface ErrorBody {
  type: 'api_error' | 'card_error' | 'idempotency_error' | 'invalid_request_error' | 'rate_limit_error';
  message: string;
  code?: string;
  param?: string;
  decline_code?: string;
  charge?: string;
  payment_intent?: string;
}

/** An answer that is an error. `saved`: execution had begun, so the idempotency key is burnt by it. */
export class ApiError extends Error {
  readonly status: number;
  readonly body: ErrorBody;
  readonly saved: boolean;

  constructor(status: number, body: ErrorBody, saved: boolean) {
    super(body.message);
    this.status = status;
    this.body = body;
    this.saved = saved;
  }
}

/** The request cannot be understood; nothing has begun, so nothing is stored under its key. */
export function invalidRequest(message: string, code?: string, param?: string): ApiError {
  return new ApiError(
    400,
    { type: 'invalid_request_error', message, ...(code && { code }), ...(param && { param }) },
    false,
  );
}

/** The request is understood but the state forbids it; the same key keeps this answer. */
export function refused(message: string, code?: string, param?: string): ApiError {
  return new ApiError(
    400,
    { type: 'invalid_request_error', message, ...(code && { code }), ...(param && { param }) },
    true,
  );
}

export function resourceMissing(noun: string, id: string, param = 'id', status = 404): ApiError {
  return new ApiError(
    status,
    { type: 'invalid_request_error', code: 'resource_missing', param, message: `No such ${noun}: '${id}'` },
    false,
  );
}

export function unauthorized(message: string): ApiError {
  return new ApiError(401, { type: 'invalid_request_error', message }, false);
}
