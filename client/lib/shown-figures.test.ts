import { describe, expect, it } from 'vitest';
import { shownFine } from './shown-figures.ts';

describe('a fine content for reading', () => {
  it.each([
    ['9.471555', { value: '9.655', unit: 'g' }, 'g', '9.472'],
    ['11.312078', { value: '12.3', unit: 'g' }, 'g', '11.3'],
    ['0.840000', { value: '1', unit: 'g' }, 'g', '1'],
    ['31.072373', { value: '1.000', unit: 'ozt' }, 'ozt', '0.999'],
    // One step is 0.001 oz t or 0.031 g: two digits of a gram tell no less.
    ['31.072373', { value: '1.000', unit: 'ozt' }, 'g', '31.07'],
    // One step is 0.001 g or 0.000032 oz t.
    ['9.471555', { value: '9.655', unit: 'g' }, 'ozt', '0.30452'],
    ['950.000000', { value: '1', unit: 'kg' }, 'g', '950'],
  ] as const)('%s g fine of %o, read in %s, is %s', (fine, gross, unit, shown) => {
    expect(shownFine(fine, gross, unit)).toBe(shown);
  });
});
