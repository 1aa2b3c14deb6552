import { z } from 'zod';
import { decimalString, instant, metalSchema } from './common.ts';

export const quoteAnswer = z.object({
  id: z.string(),
  metal: metalSchema,
  usdPerTroyOunce: decimalString,
  at: instant,
  acceptedAt: instant,
  source: z.string(),
  ageSeconds: z.number().int(),
  isFresh: z.boolean(),
  /** A value that jumped and waits to be confirmed; until then the accepted one stands and grows old. */
  isQuarantined: z.boolean(),
});
export type QuoteAnswer = z.infer<typeof quoteAnswer>;

export const quotesAnswer = z.object({
  now: instant,
  /** `fresh`: all four are; `partly`: some are; `stale`: none is; `closed`: the market is closed, the last values stand. */
  state: z.enum(['fresh', 'partly', 'stale', 'closed', 'none']),
  marketUntil: instant.nullable(),
  staleAfterSeconds: z.number().int(),
  quotes: z.array(quoteAnswer),
});
export type QuotesAnswer = z.infer<typeof quotesAnswer>;

export const quoteHistoryQuery = z.object({
  metal: metalSchema,
  days: z.coerce.number().int().min(1).max(366).default(60),
});

export const quoteHistoryAnswer = z.object({
  metal: metalSchema,
  points: z.array(
    z.object({ day: z.iso.date(), usdPerTroyOunce: decimalString, at: instant, source: z.string() }),
  ),
});
export type QuoteHistoryAnswer = z.infer<typeof quoteHistoryAnswer>;
