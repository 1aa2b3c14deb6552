import { z } from 'zod';
import { callHostedJson, HostedServiceError, hostedUrl, parseHosted } from './hosted-json.ts';

export type QuotedMetal = 'Au' | 'Ag' | 'Pt' | 'Pd';
export type BadQuoteReason =
  'missing' | 'repeated' | 'malformed' | 'not-positive' | 'out-of-bounds' | 'spread-crossed';

/** US$ per troy ounce as the decimal strings that were sent. */
export type GoodQuote = { metal: QuotedMetal; ok: true; mid: string; bid: string; ask: string; at: Date };
export type BadQuote = { metal: QuotedMetal; ok: false; reason: BadQuoteReason };
export type MetalQuote = GoodQuote | BadQuote;
export type QuoteReading = {
  marketOpen: boolean;
  /** When the market changes between open and closed next. */
  marketUntil: Date;
  /** One entry for each quoted metal, in the order Au, Ag, Pt, Pd. */
  quotes: MetalQuote[];
  /** The entries as they came, for the record of a refused quote. */
  receivedRaw: unknown[];
};
export type HistoricQuote = { metal: QuotedMetal; date: string; mid: string; at: Date };

export class QuoteServiceError extends HostedServiceError {}

export type QuoteClientOptions = { url: string; apiKey: string; timeoutMs?: number };
export type QuoteClient = {
  /** One reading of all four metals; a metal whose entry is bad is marked and does not spoil the others. */
  fetchQuotes: () => Promise<QuoteReading>;
  /** Daily values between two dates, both included; refused as a whole when any value is bad. */
  fetchHistory: (from: Date, to: Date) => Promise<HistoricQuote[]>;
};

const metals: readonly QuotedMetal[] = ['Au', 'Ag', 'Pt', 'Pd'];
const codes = { Au: 'XAU', Ag: 'XAG', Pt: 'XPT', Pd: 'XPD' } as const;
const metalOfCode = { XAU: 'Au', XAG: 'Ag', XPT: 'Pt', XPD: 'Pd' } as const;

/** Whole dollars per troy ounce: far outside any price seen, so only nonsense falls out. From memory. */
const dollarBounds: Record<QuotedMetal, { min: bigint; max: bigint }> = {
  Au: { min: 100n, max: 100_000n },
  Ag: { min: 1n, max: 5_000n },
  Pt: { min: 50n, max: 50_000n },
  Pd: { min: 50n, max: 50_000n },
};

const decimalText = z.string().regex(/^-?\d{1,15}(\.\d{1,6})?$/);
const instant = z.iso.datetime({ offset: true }).transform((text) => new Date(text));
const unitFields = { currency: z.literal('USD'), unit: z.literal('troy_ounce') };
const readingSchema = z.object({
  ...unitFields,
  market: z.object({ open: z.boolean(), until: instant }),
  quotes: z.array(z.unknown()).max(50),
});
const entrySchema = z.object({ bid: decimalText, ask: decimalText, mid: decimalText, at: instant });
const historySchema = z.object({
  ...unitFields,
  history: z.array(
    z.object({
      code: z.enum(['XAU', 'XAG', 'XPT', 'XPD']),
      days: z.array(z.object({ date: z.iso.date(), mid: decimalText, at: instant })).max(500),
    }),
  ),
});

const fail = (...args: ConstructorParameters<typeof QuoteServiceError>) => new QuoteServiceError(...args);

/** Exact: the text was checked to have at most six places. */
function micros(text: string): bigint {
  const [whole = '0', places = ''] = text.replace('-', '').split('.');
  const size = BigInt(whole + places.padEnd(6, '0'));
  return text.startsWith('-') ? -size : size;
}

function faultOfValue(metal: QuotedMetal, value: bigint): BadQuoteReason | null {
  const { min, max } = dollarBounds[metal];
  if (value <= 0n) return 'not-positive';
  return value < min * 1_000_000n || value > max * 1_000_000n ? 'out-of-bounds' : null;
}

function readEntry(metal: QuotedMetal, entries: unknown[]): MetalQuote {
  const bad = (reason: BadQuoteReason): BadQuote => ({ metal, ok: false, reason });
  const own = entries.filter((entry) => (entry as { code?: unknown } | null)?.code === codes[metal]);
  if (own.length === 0) return bad('missing');
  if (own.length > 1) return bad('repeated');
  const parsed = entrySchema.safeParse(own[0]);
  if (!parsed.success) return bad('malformed');
  const { bid, ask, mid, at } = parsed.data;
  for (const value of [mid, bid, ask]) {
    const fault = faultOfValue(metal, micros(value));
    if (fault) return bad(fault);
  }
  if (micros(bid) > micros(mid) || micros(mid) > micros(ask)) return bad('spread-crossed');
  return { metal, ok: true, mid, bid, ask, at };
}

const dayText = (date: Date) => date.toISOString().slice(0, 10);

/** The quote service. Every failure is a `QuoteServiceError`; whether a quote is stale or jumps is not decided here. */
export function createQuoteClient({ url, apiKey, timeoutMs = 2000 }: QuoteClientOptions): QuoteClient {
  const codeList = metals.map((metal) => codes[metal]).join(',');
  const call = (path: string, query: Record<string, string>) =>
    callHostedJson({ url: hostedUrl(url, path, { codes: codeList, ...query }), apiKey, timeoutMs, fail });
  return {
    async fetchQuotes() {
      const answer = parseHosted(readingSchema, await call('v1/quotes', { currency: 'USD' }), fail);
      return {
        marketOpen: answer.market.open,
        marketUntil: answer.market.until,
        quotes: metals.map((metal) => readEntry(metal, answer.quotes)),
        receivedRaw: answer.quotes,
      };
    },
    async fetchHistory(from, to) {
      const query = { from: dayText(from), to: dayText(to) };
      const answer = parseHosted(historySchema, await call('v1/history', query), fail);
      return answer.history.flatMap(({ code, days }) => {
        const metal = metalOfCode[code];
        return days.map(({ date, mid, at }) => {
          const fault = faultOfValue(metal, micros(mid));
          if (fault) throw fail('garbage', `history of ${code} on ${date}: ${fault}`);
          return { metal, date, mid, at };
        });
      });
    },
  };
}
