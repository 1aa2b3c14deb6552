import { MeasureError } from '#shared/domain-error.ts';
import { InvalidError, type FieldError } from './app-error.ts';

/** The engine's issues as field errors of an answer. */
export function fieldErrorsOfMeasure(error: MeasureError): FieldError[] {
  return error.issues.map(({ field, code, message }) => ({ pointer: field, code, message }));
}

/** Runs a step of the engine; what it refuses becomes an answer with every field named. Throws `invalid-input`. */
export function orRefuse<T>(step: () => T): T {
  try {
    return step();
  } catch (error) {
    if (error instanceof MeasureError) throw new InvalidError(fieldErrorsOfMeasure(error), error.message);
    throw error;
  }
}
