import { describe, expect, it } from 'vitest';
import { percentText, readPricing } from './lot-pricing.ts';

const typed = (change: object) => ({
  pricing: '',
  price: '',
  linkedPercent: '',
  floorPercent: '',
  ...change,
});

describe('how a draft is priced', () => {
  it('is outright unless it says otherwise, with a floor only where one is typed', () => {
    const outright = { pricingBasis: 'outright', priceMinor: 190_000n, linkedPercent: null };
    expect(readPricing(typed({ price: '1900' }))).toEqual({ ...outright, floorPercent: null });
    expect(readPricing(typed({ pricing: 'outright', price: '1900', floorPercent: '95,5' }))).toEqual({
      ...outright,
      floorPercent: '95.5',
    });
  });

  it('is a share of melt when linked, and leaves what was typed for a sum alone', () => {
    const linked = typed({ pricing: 'linked', price: 'about 5', floorPercent: 'x', linkedPercent: '98.20' });
    expect(readPricing(linked)).toEqual({
      pricingBasis: 'linked',
      priceMinor: null,
      linkedPercent: '98.2',
      floorPercent: null,
    });
  });

  it.each([
    [{ pricing: 'tender' }, '/pricing', 'pricing-unknown'],
    [{ pricing: 'linked' }, '/linkedPercent', 'number-missing'],
    [{ pricing: 'linked', linkedPercent: '98.205' }, '/linkedPercent', 'too-many-decimals'],
    [{ pricing: 'linked', linkedPercent: '0.99' }, '/linkedPercent', 'too-small'],
    [{ pricing: 'linked', linkedPercent: '150.01' }, '/linkedPercent', 'too-large'],
    [{ price: '19.99' }, '/price', 'price-too-low'],
    [{ price: '1900', floorPercent: '150.01' }, '/floorPercent', 'too-large'],
    [{ price: '1900', floorPercent: '0' }, '/floorPercent', 'too-small'],
  ])('refuses %j at %s: %s', (change, field, code) => {
    expect(() => readPricing(typed(change))).toThrowError(expect.objectContaining({ field, code }));
  });

  it('tells what is wrong with sum and floor at once', () => {
    expect(() => readPricing(typed({ price: '', floorPercent: 'x' }))).toThrowError(
      expect.objectContaining({ issues: expect.objectContaining({ length: 2 }) }),
    );
  });

  it('is read with two digits after the dot', () => {
    expect(['98.2000', '100', '99.9900'].map(percentText)).toEqual(['98.20', '100.00', '99.99']);
  });
});
