import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatAge,
  formatAmount,
  formatDate,
  formatDeadline,
  formatDecimal,
  formatLeft,
  formatMoment,
  formatMoney,
  formatMoneyRange,
} from './format.ts';

const plain = (text: string) => text.replace(/[\u00a0\u202f]/g, ' ');

describe('figures', () => {
  it('groups digits and changes none', () => {
    expect(formatDecimal('31.0240')).toBe('31.0240');
    expect(formatDecimal('-1234567.5')).toBe('−1,234,567.5');
    fc.assert(
      fc.property(
        fc.bigInt({ min: 0n, max: 10n ** 30n }),
        fc.stringMatching(/^\d{0,15}$/),
        (whole, fraction) => {
          const value = fraction === '' ? whole.toString() : `${whole}.${fraction}`;
          expect(formatDecimal(value).replaceAll(',', '')).toBe(value);
        },
      ),
    );
  });

  it('keeps a sum that no binary float can hold', () => {
    expect(plain(formatMoney('9007199254740993.07'))).toBe('US$ 9,007,199,254,740,993.07');
  });

  it('writes money with two digits and leaves a finer rate as it is', () => {
    expect(plain(formatMoney('28'))).toBe('US$ 28.00');
    expect(plain(formatMoney('-61.4'))).toBe('−US$ 61.40');
    expect(formatAmount('4182.405')).toBe('4,182.405');
  });

  it('refuses what is not a plain decimal', () => {
    expect(() => formatDecimal('1e3')).toThrow(RangeError);
    expect(() => formatMoney('')).toThrow(RangeError);
  });

  it.each([
    ['4166.71', '4170.05', 'US$ 4,160 to 4,180'],
    ['726.86', '727.90', 'US$ 726 to 728'],
    ['11.231', '11.239', 'US$ 11.2 to 11.3'],
    ['0.126', '0.13', 'US$ 0.12 to 0.13'],
    ['999.5', '999.5', 'US$ 999 to 1,000'],
  ])('rounds a range outwards to three figures: %s to %s', (low, high, shown) => {
    expect(plain(formatMoneyRange(low, high))).toBe(shown);
  });
});

describe('moments', () => {
  it('tells a moment in the given zone and names the zone', () => {
    expect(plain(formatMoment('2026-12-01T14:05:00Z', 'UTC'))).toBe('1 Dec 2026, 14:05 UTC');
    expect(plain(formatMoment('2026-07-01T22:30:00Z', 'Asia/Tokyo'))).toBe('2 Jul 2026, 07:30 GMT+9');
  });

  it('tells midnight as 00', () => {
    expect(plain(formatMoment('2026-12-01T00:00:00Z', 'UTC'))).toBe('1 Dec 2026, 00:00 UTC');
  });

  it('tells a deadline with what is left, and when it has passed', () => {
    const now = Date.parse('2026-12-06T13:40:00Z');
    expect(plain(formatDeadline('2026-12-11T11:20:00Z', 'UTC', now))).toBe(
      'Fri 11 Dec, 11:20 UTC (4 d 21 h left)',
    );
    expect(plain(formatDeadline('2026-12-06T13:39:59Z', 'UTC', now))).toBe('Sun 6 Dec, 13:39 UTC (passed)');
  });

  it('never says more time is left than there is', () => {
    expect(plain(formatLeft('1970-01-01T00:59:59Z', 0) ?? '')).toBe('59 min');
    expect(formatLeft('1970-01-01T00:00:00Z', 0)).toBeNull();
  });

  it('tells an age in whole units', () => {
    expect(plain(formatAge('1970-01-01T00:00:00Z', 40_999))).toBe('40 s');
    expect(plain(formatAge('1970-01-01T00:00:00Z', 2 * 3_600_000))).toBe('2 h');
  });

  it('leaves a plain date on its day', () => {
    expect(formatDate('2026-11-21')).toBe('21 November 2026');
  });
});
