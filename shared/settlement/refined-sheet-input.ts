import { z } from 'zod';
import { ASSAY_METHOD_KEYS } from '../assay/methods.ts';
import { FINENESS_UNITS } from '../fineness.ts';
import { MASS_UNITS } from '../mass.ts';
import { METALS, OTHER_ELEMENTS } from '../metals.ts';
import { BALANCE_CLASSES } from '../uncertainty.ts';
import type { RefinedSheetInput } from './sheet-types.ts';

const text = z.string().max(40);
const massEntrySchema = z.strictObject({ value: text, unit: z.enum(MASS_UNITS) });
const finenessEntrySchema = z.strictObject({ value: text, unit: z.enum(FINENESS_UNITS) });
const amountSchema = z.strictObject({ amount: text });

const quoteRefSchema = z.strictObject({
  id: z.string().max(64).nullable(),
  metal: z.enum(METALS),
  usdPerTroyOunce: text,
  at: z.string().max(40).nullable(),
  source: z.string().max(80),
});

const contentSchema = z.strictObject({
  metal: z.enum([...METALS, ...OTHER_ELEMENTS]),
  fineness: finenessEntrySchema,
  uncertainty: finenessEntrySchema.nullable(),
  method: z.enum(ASSAY_METHOD_KEYS),
  paidFor: z.boolean(),
});

/**
 * Shape of the stored input of a refined lot's sheet. It checks the shape only; the values (bounds, decimals, totals)
 * are checked by `refinedSheet`, which answers with the same JSON pointers.
 */
export const refinedSheetInputSchema: z.ZodType<RefinedSheetInput> = z.strictObject({
  gross: massEntrySchema,
  readability: massEntrySchema.nullable(),
  balanceClass: z.enum(BALANCE_CLASSES).nullable().optional(),
  contents: z.array(contentSchema).max(METALS.length + OTHER_ELEMENTS.length),
  quotes: z.array(quoteRefSchema).max(METALS.length),
  price: z.union([amountSchema, z.strictObject({ percent: text })]).nullable(),
  shipping: amountSchema.nullable(),
  commission: z.strictObject({ method: z.string().max(40), percent: text, minimum: text }).nullable(),
  weightStep: text.optional(),
  moment: z.enum(['estimated', 'provisional', 'final']),
  audience: z.enum(['buyer', 'seller']),
});
