import { ERROR_CODES, type ErrorCode } from '#shared/error-codes.ts';

export type FieldError = { pointer: string; code: string; message: string };

/** A refusal that the caller can understand. Everything else is a fault and becomes a 500 with an id. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly status: number;
  readonly errors: readonly FieldError[];

  constructor(code: ErrorCode, detail?: string, errors: readonly FieldError[] = []) {
    super(detail ?? ERROR_CODES[code].title);
    this.name = 'AppError';
    this.code = code;
    this.status = ERROR_CODES[code].status;
    this.errors = errors;
  }
}

/** Not there, or not visible to you: the two are never told apart. */
export class NotFoundError extends AppError {
  constructor(detail?: string) {
    super('not-found', detail);
  }
}

/** Visible, but not yours to do. */
export class ForbiddenError extends AppError {
  constructor(code: ErrorCode = 'forbidden', detail?: string) {
    super(code, detail);
  }
}

/** The row is not in a state that allows this; nothing was changed. */
export class ConflictError extends AppError {}

/** Fields that need another value; nothing was changed and nothing typed is lost. */
export class InvalidError extends AppError {
  constructor(errors: readonly FieldError[], detail?: string) {
    super('invalid-input', detail, errors);
  }
}

/** Something that cannot happen unless the program is wrong; stays on in production. */
export function invariant(condition: unknown, message: string): asserts condition {
  if (!condition) throw new Error(`invariant: ${message}`);
}
