import type { z } from 'zod';
import type { valuationAnswer, ValuationBody } from '#shared/schemas/valuations.ts';
import { apiSend } from '../../../lib/api-client.ts';

export type Valuation = z.infer<typeof valuationAnswer>;

/** What a mass and an assay are worth; needs no account. */
export function valueMetal(body: ValuationBody): Promise<Valuation> {
  return apiSend<Valuation>('/api/v1/valuations', { body });
}
