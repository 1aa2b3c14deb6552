import { describe, expect, it } from 'vitest';
import { compareReceivedMass, type StatedMass } from './received-mass.ts';

const lot: StatedMass = {
  gross: { value: '31.62', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
};

describe('compareReceivedMass', () => {
  it('agrees with the same reading', () => {
    expect(compareReceivedMass(lot, { value: '31.62', unit: 'g' })).toEqual({
      differenceGrams: '0',
      isWithinScales: true,
    });
  });

  it('allows what a coarser scale cannot tell', () => {
    // One step of each: 0.01 g + 0.1 g.
    expect(compareReceivedMass(lot, { value: '31.6', unit: 'g' })).toEqual({
      differenceGrams: '-0.02',
      isWithinScales: true,
    });
    expect(compareReceivedMass(lot, { value: '31.7', unit: 'g' }).isWithinScales).toBe(true);
    expect(compareReceivedMass(lot, { value: '31.8', unit: 'g' }).isWithinScales).toBe(false);
  });

  it('sees a difference beyond both scales', () => {
    expect(compareReceivedMass(lot, { value: '31.60', unit: 'g' }).isWithinScales).toBe(true);
    expect(compareReceivedMass(lot, { value: '31.59', unit: 'g' })).toEqual({
      differenceGrams: '-0.03',
      isWithinScales: false,
    });
  });

  it('compares across units exactly', () => {
    const ounce: StatedMass = {
      gross: { value: '1', unit: 'ozt' },
      readability: { value: '0.001', unit: 'ozt' },
    };
    expect(compareReceivedMass(ounce, { value: '31.103477', unit: 'g' })).toEqual({
      differenceGrams: '0',
      isWithinScales: true,
    });
  });

  it('takes the last digit typed where the lot gives no readability', () => {
    const silent = { ...lot, readability: null };
    expect(compareReceivedMass(silent, { value: '31.625', unit: 'g' }).isWithinScales).toBe(true);
    expect(compareReceivedMass(silent, { value: '31.632', unit: 'g' }).isWithinScales).toBe(false);
  });

  it('refuses what is no mass', () => {
    expect(() => compareReceivedMass(lot, { value: '0', unit: 'g' })).toThrow(/above 0/);
  });
});
