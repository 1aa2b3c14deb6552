import { describe, expect, it } from 'vitest';
import { PRICE_MINOR_MAX } from './limits.ts';
import { checkPrice } from './lot-pricing.ts';
import { groupThousands } from './money.ts';

describe('groupThousands', () => {
  it.each([
    ['0', '0'],
    ['999.99', '999.99'],
    ['1000', '1,000'],
    ['-1000.50', '-1,000.50'],
    ['990000.00', '990,000.00'],
    ['1234567.8901234', '1,234,567.8901234'],
  ])('writes %s as %s', (plain, grouped) => {
    expect(groupThousands(plain)).toBe(grouped);
  });

  it('makes the limit of a price readable', () => {
    expect(() => checkPrice(PRICE_MINOR_MAX + 1n)).toThrow('The highest price is US$ 990,000.00:');
  });
});
