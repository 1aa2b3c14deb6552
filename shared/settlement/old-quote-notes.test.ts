import { describe, expect, it } from 'vitest';
import { oldQuoteNotes } from './old-quote-notes.ts';
import type { QuoteRef } from './sheet-types.ts';

const AT = '2026-12-01T14:02:30.000Z';
const gold: QuoteRef = { id: 'q1', metal: 'Au', usdPerTroyOunce: '4182.4', at: AT, source: 'test' };
const silver: QuoteRef = { ...gold, id: 'q2', metal: 'Ag', usdPerTroyOunce: '51.125' };
const later = (minutes: number) => new Date(Date.parse(AT) + minutes * 60_000);
const isFresh = ({ metal }: QuoteRef) => metal === 'Ag';

describe('the notes on old quotes', () => {
  it('name each quote that was not fresh, with its time and its age', () => {
    expect(oldQuoteNotes([gold, silver], { isFresh, isMarketClosed: false, now: later(12.9) })).toEqual([
      {
        field: '/quotes/Au',
        value: 'US$ 4,182.4/oz t',
        reason: 'No fresh quote at agreement: the quote of 2026-12-01, 14:02 UTC was 12 minutes old.',
      },
    ]);
  });

  it.each([
    [1, '1 minute old'],
    [119, '119 minutes old'],
    [120, '2 hours old'],
    [2879, '47 hours old'],
    [2880, '2 days old'],
  ])('tell an age of %i minutes as %s', (minutes, text) => {
    const [note] = oldQuoteNotes([gold], { isFresh, isMarketClosed: true, now: later(minutes) });
    expect(note?.reason).toBe(
      `The market was closed at agreement: the quote of 2026-12-01, 14:02 UTC was ${text}.`,
    );
  });

  it('are none where every quote is fresh', () => {
    expect(oldQuoteNotes([silver], { isFresh, isMarketClosed: false, now: later(1) })).toEqual([]);
  });
});
