import { z } from 'zod';
import { MeasureError } from '#shared/domain-error.ts';
import { METALS, type Metal } from '#shared/metals.ts';
import { metalSchema } from '#shared/schemas/common.ts';
import { REGISTER_SORTS, type RegisterQuery } from '#shared/schemas/lots.ts';
import { parseRate } from '#shared/settlement/rate.ts';
import { InvalidError } from '#server/app-error.ts';
import type { QuoteBoard } from '#server/features/quotes/quote-queries.ts';

/** US$ per troy ounce by metal: what a listing is ranked at from its first page to its last. */
export type RankQuotes = Partial<Record<Metal, string>>;

/** What is ranked together: the sums of one metal, or the linked lots of all metals, whose key is their percentage. */
export type Stream = Metal | 'linked';

/** Where a page ended: the sort's own value of the last row, its stream where streams are merged, and its id. */
export type Position = { stream: Stream | null; value: string | null; id: string };

export type Cursor = { sort: RegisterQuery['sort']; quotes: RankQuotes; position: Position };

const rate = z.string().refine((text) => {
  try {
    return parseRate(text, '').gt(0);
  } catch (error) {
    if (error instanceof MeasureError) return false;
    throw error;
  }
});

const wire = z.object({
  s: z.enum(REGISTER_SORTS),
  q: z.partialRecord(metalSchema, rate),
  m: z.union([metalSchema, z.literal('linked')]).nullable(),
  v: z
    .string()
    .max(40)
    .regex(/^(\d{1,22}(\.\d{1,15})?|\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}\.\d{3}Z)$/)
    .nullable(),
  i: z.uuid(),
});

/** The newest quotes, as they are when a listing begins. */
export function rankQuotesOf(board: QuoteBoard): RankQuotes {
  return Object.fromEntries(
    METALS.flatMap((metal) => {
      const quote = board.byMetal[metal];
      return quote === undefined ? [] : [[metal, quote.usdPerTroyOunce]];
    }),
  );
}

/** A cursor names the quotes of its listing, so that pages fit together even when the quote moves in between. */
export function writeCursor({ sort, quotes, position }: Cursor): string {
  const body = { s: sort, q: quotes, m: position.stream, v: position.value, i: position.id };
  return Buffer.from(JSON.stringify(body)).toString('base64url');
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(Buffer.from(text, 'base64url').toString('utf8'));
  } catch {
    return null;
  }
}

/** Reads a cursor back. Throws `invalid-input` at `/cursor` for anything that this register did not write for this sort. */
export function readCursor(text: string, sort: RegisterQuery['sort']): Cursor {
  const parsed = wire.safeParse(readJson(text));
  const isInstant = parsed.data?.v?.includes('T') ?? false;
  if (!parsed.success || parsed.data.s !== sort || isInstant !== (sort === 'newest')) {
    const message = 'This page mark is not known; begin at the first page.';
    throw new InvalidError([{ pointer: '/cursor', code: 'cursor-unknown', message }]);
  }
  const { q, m, v, i } = parsed.data;
  return { sort, quotes: q, position: { stream: m, value: v, id: i } };
}
