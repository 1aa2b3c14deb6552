import { describe, expect, it } from 'vitest';
import type { QuoteAnswer, QuotesAnswer } from '#shared/schemas/quotes.ts';
import { quoteText } from '../components/figures/quote-note.tsx';
import { quoteStateOf } from './quotes.ts';

function quote(metal: QuoteAnswer['metal'], at: string, isFresh = true): QuoteAnswer {
  return {
    id: metal,
    metal,
    usdPerTroyOunce: '1',
    at,
    acceptedAt: at,
    source: 's',
    ageSeconds: 0,
    isFresh,
    isQuarantined: false,
  };
}

function answer(
  state: QuotesAnswer['state'],
  quotes: QuoteAnswer[],
  marketUntil: string | null = null,
): QuotesAnswer {
  return { now: '2026-12-01T14:02:40.000Z', state, marketUntil, staleAfterSeconds: 300, quotes };
}

const now = Date.parse('2026-12-01T14:02:40Z');
const said = (given: QuotesAnswer) => quoteText(quoteStateOf(given), 'UTC', now).replace(/\u00a0/g, ' ');
const older = '2026-12-01T14:02:00.000Z';
const newer = '2026-12-01T14:02:30.000Z';

describe('the word on the quotes', () => {
  it('speaks of the oldest quote', () => {
    expect(said(answer('fresh', [quote('Au', newer), quote('Ag', older)]))).toBe('quote 14:02, 40 s');
  });

  it('says that some are stale and leaves those out', () => {
    const stale = quote('Ag', '2026-12-01T13:00:00.000Z', false);
    expect(said(answer('partly', [quote('Au', newer), stale]))).toBe('some quotes stale, others 14:02');
  });

  it('says plainly that there is none', () => {
    expect(said(answer('stale', [quote('Au', '2026-12-01T13:00:00.000Z', false)]))).toBe(
      'no fresh quote since 13:00',
    );
    expect(said(answer('none', []))).toBe('no fresh quote');
  });

  it('says until when the market is closed', () => {
    const closed = answer('closed', [quote('Au', older)], '2026-12-02T23:00:00.000Z');
    expect(said(closed)).toBe('market closed until Wed 2 Dec, 23:00 UTC');
    expect(said({ ...closed, marketUntil: null })).toBe('market closed');
  });
});
