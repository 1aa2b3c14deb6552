import { describe, expect, it } from 'vitest';
import { whyPackagesAreStale } from './packages.mjs';

describe('whether npm ci is needed', () => {
  const wanted = {
    '': { version: '0.1.0' },
    'node_modules/one': { version: '1.2.3' },
    'node_modules/other-system': { version: '4.0.0', optional: true },
  };

  it('is not when all is installed but what belongs to other systems', () => {
    expect(whyPackagesAreStale(wanted, { 'node_modules/one': { version: '1.2.3' } })).toBeUndefined();
  });

  it.each([
    ['nothing is installed', undefined, 'nothing is installed yet'],
    ['a package is missing', {}, 'node_modules/one is missing'],
    [
      'a package is older',
      { 'node_modules/one': { version: '1.2.2' } },
      'node_modules/one is 1.2.2, not 1.2.3',
    ],
    [
      'an optional package is older',
      { 'node_modules/one': { version: '1.2.3' }, 'node_modules/other-system': { version: '3.9.9' } },
      'node_modules/other-system is 3.9.9, not 4.0.0',
    ],
  ])('is when %s', (_title, installed, reason) => {
    expect(whyPackagesAreStale(wanted, installed)).toBe(reason);
  });
});
