import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { apportion } from './apportion.ts';
import { dec } from './decimal.ts';

const weightsOf = (...texts: string[]) => texts.map((text) => dec(text));

describe('apportion', () => {
  it('gives what is left to the largest remainders, the earlier of equals first', () => {
    expect(apportion(10n, weightsOf('1', '1', '1'))).toEqual([4n, 3n, 3n]);
    expect(apportion(10n, weightsOf('0.24', '0.26', '0.5'))).toEqual([2n, 3n, 5n]);
    expect(apportion(1n, weightsOf('0.3', '0.4', '0.3'))).toEqual([0n, 1n, 0n]);
    expect(apportion(2n, weightsOf('1', '1', '1', '1'))).toEqual([1n, 1n, 0n, 0n]);
  });

  it('gives a weight of zero nothing', () => {
    expect(apportion(7n, weightsOf('0', '3', '0', '4'))).toEqual([0n, 3n, 0n, 4n]);
  });

  it('mirrors a negative whole', () => {
    const weights = fc.array(fc.bigInt({ min: 1n, max: 10n ** 12n }), { minLength: 1, maxLength: 8 });
    fc.assert(
      fc.property(fc.bigInt({ min: 0n, max: 10n ** 15n }), weights, (whole, parts) => {
        const decimals = parts.map((part) => dec(part));
        const shares = apportion(whole, decimals);
        expect(apportion(-whole, decimals)).toEqual(shares.map((share) => -share));
        expect(shares.reduce((sum, share) => sum + share, 0n)).toBe(whole);
      }),
    );
  });

  it('stays exact for weights whose quotients never end', () => {
    const thirds = [dec('1').div(3), dec('1').div(3), dec('1').div(3)];
    expect(apportion(3n * 10n ** 20n, thirds)).toEqual([10n ** 20n, 10n ** 20n, 10n ** 20n]);
  });
});
