import { z } from 'zod';
import { METALS } from '../metals.ts';
import { decimalString, instant, metalSchema } from './common.ts';

// A unit or value that is left out reaches the engine as blank, whose refusal names the field and the way out.
const entry = z.strictObject({ value: z.string().max(80).default(''), unit: z.string().max(20).default('') });

/** Any mass and assay; numbers as strings with a dot. Readability, uncertainty and quotes are optional. */
export const valuationRequest = z.strictObject({
  mass: entry.prefault({}),
  readability: entry.nullish(),
  contents: z
    .array(
      z.strictObject({
        metal: z.string().max(4).default(''),
        fineness: entry.prefault({}),
        uncertainty: entry.nullish(),
        method: z.string().max(32).optional(),
      }),
    )
    .max(METALS.length * 2)
    .default([]),
  /** US$ per troy ounce of fine metal, by metal; a metal without one is valued at the newest accepted quote. */
  quotes: z.partialRecord(metalSchema, z.string().max(80)).optional(),
});
export type ValuationBody = z.infer<typeof valuationRequest>;

export const valuationAnswer = z.object({
  metals: z.array(
    z.object({
      metal: metalSchema,
      fineGrams: decimalString,
      fineTroyOunces: decimalString,
      value: decimalString,
      quote: z.object({ usdPerTroyOunce: decimalString, at: instant.nullable(), source: z.string() }),
    }),
  ),
  total: z.object({
    currency: z.literal('USD'),
    value: decimalString,
    low: decimalString,
    high: decimalString,
  }),
  assumed: z.array(z.object({ field: z.string(), value: z.string(), reason: z.string() })),
});
