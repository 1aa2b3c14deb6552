import { z } from 'zod';
import { isCountryCode } from '../countries.ts';
import { wordsForIssue } from './issue-words.ts';

// A strict content policy forbids `eval`, which zod would otherwise probe for.
// People read these words beside a field, so none of the library's own reach them.
z.config({ jitless: true, customError: wordsForIssue });

/** A plain decimal number as a string, dot as separator, no exponent: how every figure travels. */
export const decimalString = z
  .string()
  .regex(/^-?\d{1,30}(\.\d{1,20})?$/, 'Write a plain number with a dot, such as 12.34');

/** A value with its unit, both as entered. */
export const quantitySchema = z.object({ value: z.string(), unit: z.string() });
export type Quantity = z.infer<typeof quantitySchema>;

/** Money on the wire: major units with two decimals, and the currency's code. */
export const moneySchema = z.object({ currency: z.literal('USD'), amount: decimalString });
export type MoneyAnswer = z.infer<typeof moneySchema>;

export const instant = z.iso.datetime();

export const lotCode = z.string().regex(/^S-[0-9A-Z]{6}$/);
export const dealCode = z.string().regex(/^D-[0-9A-Z]{6}$/);
export const idParam = z.object({ id: z.uuid() });

export const WEIGHT_UNITS = ['g', 'ozt', 'dwt', 'gr'] as const;
export const weightUnitSchema = z.enum(WEIGHT_UNITS);
export type WeightUnit = z.infer<typeof weightUnitSchema>;

export const METAL_SYMBOLS = ['Au', 'Ag', 'Pt', 'Pd'] as const;
export const metalSchema = z.enum(METAL_SYMBOLS);

/** An assigned code of ISO 3166-1 alpha-2; compared with a lot's destinations. */
export const countryCode = z.string().refine(isCountryCode, 'Use a country’s two-letter code, such as US');
