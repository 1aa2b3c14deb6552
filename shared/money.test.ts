import fc from 'fast-check';
import { describe, expect, expectTypeOf, it } from 'vitest';
import { rational, ratio, times, nearest } from './testing/rational.ts';
import { apportion } from './apportion.ts';
import { dec } from './decimal.ts';
import { MeasureError } from './domain-error.ts';
import {
  AMOUNT_MAX_MINOR,
  MINOR_DIGITS,
  ZERO,
  add,
  allocate,
  compare,
  fromAmount,
  isZero,
  minorToAmount,
  money,
  negate,
  percentOf,
  roundToMinor,
  subtract,
  toAmount,
  usd,
  type Currency,
  type Money,
} from './money.ts';

const minor = fc.bigInt({ min: -AMOUNT_MAX_MINOR, max: AMOUNT_MAX_MINOR });
const euros = { currency: 'EUR', minor: 100n } as unknown as Money;

function codeOf(step: () => unknown): string {
  try {
    step();
  } catch (error) {
    if (error instanceof MeasureError) return error.code;
    throw error;
  }
  return 'accepted';
}

describe('currency', () => {
  it('has two minor digits for USD (ISO 4217 List One; the row is from memory)', () => {
    expect(MINOR_DIGITS.USD).toBe(2);
  });

  it('refuses a second currency wherever money is made or combined', () => {
    expect(codeOf(() => money('EUR', 1n))).toBe('currency-not-supported');
    expect(codeOf(() => money('usd', 1n))).toBe('currency-not-supported');
    // ISO 4217 List One: JPY has no minor unit (0), and the metals' codes XAU, XAG, XPT and XPD have none at all ("N.A.",
    // literal text): neither may ever reach arithmetic in hundredths. XAU's row and JPY's digits are read second-hand.
    for (const code of ['JPY', 'XAU', 'XAG', 'XPT', 'XPD']) {
      expect(
        codeOf(() => money(code, 1n)),
        code,
      ).toBe('currency-not-supported');
    }
    expect(money('USD', 5n)).toEqual(usd(5n));
    expect(codeOf(() => add(usd(1n), euros))).toBe('currency-mismatch');
    expect(codeOf(() => subtract(usd(1n), euros))).toBe('currency-mismatch');
    expect(codeOf(() => compare(euros, usd(1n)))).toBe('currency-mismatch');
  });

  it('is part of the type', () => {
    expectTypeOf<Money['currency']>().toEqualTypeOf<'USD'>();
    expectTypeOf<Money['minor']>().toEqualTypeOf<bigint>();
    expectTypeOf<Currency>().toEqualTypeOf<'USD'>();
    // @ts-expect-error a second currency is no Money
    const other: Money = { currency: 'EUR', minor: 1n };
    // @ts-expect-error a JavaScript number is no count of cents
    const floating: Money = { currency: 'USD', minor: 1 };
    // @ts-expect-error a bare bigint has no currency
    const bare: Money = 1n;
    expect([other, floating, bare]).toHaveLength(3);
  });
});

describe('arithmetic', () => {
  it('adds, subtracts, negates and compares to the cent', () => {
    expect(add(usd(10n), usd(20n), usd(-5n))).toEqual(usd(25n));
    expect(add()).toEqual(ZERO);
    expect(subtract(usd(10n), usd(25n))).toEqual(usd(-15n));
    expect(negate(usd(7n))).toEqual(usd(-7n));
    expect([compare(usd(1n), usd(2n)), compare(usd(2n), usd(2n)), compare(usd(3n), usd(2n))]).toEqual([
      -1, 0, 1,
    ]);
    expect([isZero(ZERO), isZero(usd(1n))]).toEqual([true, false]);
  });

  it('gives back the first after adding and subtracting the second', () => {
    fc.assert(
      fc.property(minor, minor, (left, right) => {
        expect(subtract(add(usd(left), usd(right)), usd(right))).toEqual(usd(left));
      }),
    );
  });
});

describe('allocate', () => {
  it.each([
    [100n, ['1', '1', '1'], [34n, 33n, 33n]],
    [-100n, ['1', '1', '1'], [-34n, -33n, -33n]],
    [5n, ['0.7', '0.3'], [4n, 1n]],
    [1n, ['0', '1'], [0n, 1n]],
    [0n, ['2', '3'], [0n, 0n]],
    [10n, ['1'], [10n]],
    [101n, ['50', '50'], [51n, 50n]],
  ])('splits %s by %s into %s', (whole, weights, shares) => {
    expect(allocate(usd(whole), weights).map((share) => share.minor)).toEqual(shares);
  });

  it('gives shares that add up to the whole, each within a cent of its exact part', () => {
    const weights = fc.array(fc.bigInt({ min: 0n, max: 10n ** 9n }), { minLength: 1, maxLength: 9 });
    fc.assert(
      fc.property(minor, weights, (whole, parts) => {
        const total = parts.reduce((sum, part) => sum + part, 0n);
        fc.pre(total > 0n);
        const shares = allocate(usd(whole), parts);
        expect(add(...shares)).toEqual(usd(whole));
        shares.forEach((share, index) => {
          const gap = share.minor * total - whole * (parts[index] ?? 0n);
          expect(gap < total && gap > -total).toBe(true);
        });
      }),
    );
  });

  it('refuses weights that say nothing', () => {
    expect(codeOf(() => allocate(usd(1n), []))).toBe('weights-not-usable');
    expect(codeOf(() => allocate(usd(1n), ['0', '0']))).toBe('weights-not-usable');
    expect(codeOf(() => allocate(usd(1n), ['2', '-1']))).toBe('weights-not-usable');
    expect(codeOf(() => apportion(1n, [dec('NaN')]))).toBe('weights-not-usable');
  });
});

describe('rounding to the cent', () => {
  it.each([
    ['727.384', 72738n],
    ['0.005', 1n],
    ['-0.005', -1n],
    ['0.0049999', 0n],
    ['1.005', 101n],
  ])('rounds US$ %s to %s cents', (amount, cents) => {
    expect(roundToMinor(dec(amount))).toBe(cents);
  });

  it.each([
    [10_000n, '1.5', 150n],
    [333n, '1.5', 5n],
    [30n, '5', 2n],
    [-30n, '5', -2n],
    [412_135n, '4', 16_485n],
    [412_137n, '4', 16_485n],
    [412_138n, '4', 16_486n],
  ])('takes of %s cents %s %% as %s cents, rounded once', (whole, percent, share) => {
    expect(percentOf(usd(whole), percent)).toEqual(usd(share));
  });

  it('takes percentages as exact fractions on BigInt do', () => {
    fc.assert(
      fc.property(minor, fc.integer({ min: 0, max: 1_000_000 }), (whole, tenThousandths) => {
        const percent =
          (BigInt(tenThousandths) / 10_000n).toString() +
          `.${String(tenThousandths % 10_000).padStart(4, '0')}`;
        const exact = times(ratio(whole, 1n), rational(percent), ratio(1n, 100n));
        expect(percentOf(usd(whole), percent).minor).toBe(nearest(exact));
      }),
    );
  });

  it('refuses a percentage that is no number', () => {
    expect(codeOf(() => percentOf(usd(1n), '1,5'))).toBe('decimal-comma');
    expect(codeOf(() => percentOf(usd(1n), 'half'))).toBe('not-a-decimal');
  });
});

describe('amount text', () => {
  it.each([
    [72_738n, '727.38'],
    [-200n, '-2.00'],
    [5n, '0.05'],
    [-5n, '-0.05'],
    [0n, '0.00'],
    [10n ** 20n, '1000000000000000000.00'],
  ])('writes %s cents as %s', (cents, text) => {
    expect(toAmount(usd(cents))).toBe(text);
    expect(minorToAmount(cents)).toBe(text);
  });

  it('reads back what it wrote', () => {
    fc.assert(
      fc.property(minor, (cents) => {
        expect(fromAmount(toAmount(usd(cents)))).toEqual(usd(cents));
      }),
    );
  });

  it.each([
    ['727.38', 72_738n],
    ['727.3', 72_730n],
    ['727', 72_700n],
    ['-2.00', -200n],
  ])('reads %s', (text, cents) => {
    expect(fromAmount(text)).toEqual(usd(cents));
  });

  it.each([
    ['727.385', 'too-many-decimals'],
    ['7e2', 'not-a-decimal'],
    ['1,000.00', 'not-a-decimal'],
    ['1000,00', 'decimal-comma'],
    ['$5', 'not-a-decimal'],
    ['', 'not-a-decimal'],
    ['1000000000.00', 'too-large'],
    ['-1000000000.00', 'too-small'],
  ])('refuses %j as %s', (text, code) => {
    expect(codeOf(() => fromAmount(text, '/price/amount'))).toBe(code);
  });
});
