import { z } from 'zod';
import { invalidRequest } from './errors.ts';
import type { ApiError } from './errors.ts';

/** Form bodies hold only strings; these read the few types that the API knows. */
export const text = z.string().min(1);
export const flag = z.enum(['true', 'false']).transform((value) => value === 'true');
export const integer = z
  .string()
  .regex(/^-?\d{1,15}$/, 'Invalid integer')
  .transform((value) => Number.parseInt(value, 10));
export const amount = integer
  .refine((value) => value > 0, 'Invalid positive integer')
  .refine((value) => value <= 99_999_999, 'Amount must be no more than $999,999.99');
export const currency = z
  .string()
  .transform((value) => value.toLowerCase())
  .refine((value) => value === 'usd', 'Invalid currency: the stand-in knows usd only');
/** An empty string unsets a key. */
export const metadata = z
  .record(z.string().max(40), z.string().max(500))
  .refine((value) => Object.keys(value).length <= 50, 'Too many metadata keys');
export const url = z.url({ protocol: /^https?$/ });
const range = z.union([
  integer,
  z.strictObject({ gt: integer, gte: integer, lt: integer, lte: integer }).partial(),
]);
export const listInput = {
  limit: integer.refine((value) => value >= 1 && value <= 100, 'Invalid limit: from 1 to 100').optional(),
  starting_after: text.optional(),
  ending_before: text.optional(),
  created: range.optional(),
};

/** Holds the names in a request's shape to those of the SDK: `satisfies ShapeOf<Stripe.RefundCreateParams>`. */
export type ShapeOf<Params> = Partial<Record<keyof Params, z.ZodType>>;

function bracketed(path: readonly PropertyKey[]): string {
  return path.map((part, index) => (index === 0 ? String(part) : `[${String(part)}]`)).join('');
}

type Issue = z.core.$ZodIssue;

function asApiError(issue: Issue): ApiError {
  if (issue.code === 'unrecognized_keys') {
    const param = bracketed([...issue.path, issue.keys[0] ?? '']);
    return invalidRequest(`Received unknown parameter: ${param}`, 'parameter_unknown', param);
  }
  const param = bracketed(issue.path);
  if (issue.code === 'invalid_type' && issue.input === undefined) {
    return invalidRequest(`Missing required param: ${param}.`, 'parameter_missing', param);
  }
  if (issue.code === 'invalid_type' && issue.input === '') {
    return invalidRequest(`Empty value for ${param}.`, 'parameter_invalid_empty', param);
  }
  const isInteger = /integer/i.test(issue.message);
  return invalidRequest(
    `${issue.message}: ${param}`,
    isInteger ? 'parameter_invalid_integer' : undefined,
    param,
  );
}

/** Checks a request against its schema and answers in the API's own error form. */
export function readInput<S extends z.ZodType>(schema: S, raw: unknown): z.output<S> {
  const result = schema.safeParse(raw, { reportInput: true });
  if (result.success) return result.data;
  const issues = result.error.issues;
  // An unknown name is told before a missing one, since it is usually the same mistake misspelt.
  const first = issues.find((issue) => issue.code === 'unrecognized_keys') ?? issues[0];
  throw first ? asApiError(first) : invalidRequest('Invalid request');
}

/** Merges metadata the way the API does: an empty value removes its key. */
export function mergeMetadata(
  present: Record<string, string>,
  change: Record<string, string> | undefined,
): Record<string, string> {
  const merged = { ...present, ...change };
  return Object.fromEntries(Object.entries(merged).filter(([, value]) => value !== ''));
}
