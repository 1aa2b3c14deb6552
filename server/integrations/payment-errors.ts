/**
 * `unavailable`: no answer, or one that says nothing of the request; the same request comes again under the same key.
 * `refused`: a definite no; nothing happened at the provider, and the key is burnt.
 * `burnt`: a failure that the provider keeps under the key and answers for ever; whether anything happened is not known.
 * `conflict`: the key was used for something else; a fault of ours.
 */
export type PaymentFailureKind = 'unavailable' | 'refused' | 'burnt' | 'conflict';

/** The payment provider did not do what was asked. */
export class PaymentProviderError extends Error {
  readonly kind: PaymentFailureKind;
  /** The provider's own code, such as `balance_insufficient`, or a word for what went wrong on the way. */
  readonly code: string;
  readonly param: string | null;

  constructor(
    kind: PaymentFailureKind,
    code: string,
    message: string,
    options: { cause?: unknown; param?: string | null } = {},
  ) {
    super(message, { cause: options.cause });
    this.name = 'PaymentProviderError';
    this.kind = kind;
    this.code = code;
    this.param = options.param ?? null;
  }
}

/** The fields of the SDK's errors that decide; read by shape, so that the SDK stays in one file. */
type SdkError = Error & {
  type: string;
  code?: string;
  decline_code?: string;
  param?: string;
  statusCode?: number;
  headers?: Record<string, string>;
};

function isSdkError(error: unknown): error is SdkError {
  return error instanceof Error && typeof (error as Partial<SdkError>).type === 'string';
}

/** A failure of the provider's own that it has kept: the same request under the same key will never get another answer. */
function isKeptFailure({ statusCode = 0, headers = {} }: SdkError): boolean {
  return statusCode >= 500 && headers['idempotent-replayed'] === 'true';
}

const UNAVAILABLE_TYPES = new Set(['StripeConnectionError', 'StripeAPIError', 'StripeRateLimitError']);

function kindOf(error: SdkError): PaymentFailureKind {
  if (error.type === 'StripeIdempotencyError') return 'conflict';
  if (isKeptFailure(error)) return 'burnt';
  if (UNAVAILABLE_TYPES.has(error.type)) return 'unavailable';
  // Wrong or revoked keys are ours to mend; the request itself was never looked at.
  if (error.statusCode === 401 || error.statusCode === 403) return 'unavailable';
  return 'refused';
}

/** Under its key the request will never succeed: it may be made anew, under the next. */
export function needsNewKey(error: unknown): error is PaymentProviderError {
  return error instanceof PaymentProviderError && (error.kind === 'refused' || error.kind === 'burnt');
}

/** Whatever the SDK threw, as the one error that the rest of the server knows. */
export function toPaymentProviderError(error: unknown): PaymentProviderError {
  if (error instanceof PaymentProviderError) return error;
  if (!isSdkError(error)) {
    return new PaymentProviderError('unavailable', 'unreadable-answer', 'The answer could not be read', {
      cause: error,
    });
  }
  const code = error.code ?? error.decline_code ?? error.type;
  return new PaymentProviderError(kindOf(error), code, error.message, {
    cause: error,
    param: error.param ?? null,
  });
}
