import { MeasureError } from '#shared/domain-error.ts';
import type { ValuationBody } from '#shared/schemas/valuations.ts';
import { valuate, type ValuationAnswer, type ValuationRequest } from '#shared/settlement/valuation.ts';
import { AppError, InvalidError } from '#server/app-error.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import { fieldErrorsOfMeasure } from '#server/refused.ts';

/**
 * Values a mass and an assay at the quotes given, else at `current`. The engine checks every value, so the body is handed
 * on as it came: units and symbols that it does not know are refused there, at their field.
 * Throws `invalid-input`; `no-fresh-quote` when nothing but an accepted quote is missing.
 */
export function valueMass(body: ValuationBody, current: readonly QuoteRef[]): ValuationAnswer {
  try {
    return valuate(body as ValuationRequest, current);
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    const errors = fieldErrorsOfMeasure(error);
    if (errors.every(({ code }) => code === 'quote-missing')) {
      throw new AppError('no-fresh-quote', error.message, errors);
    }
    throw new InvalidError(errors);
  }
}
