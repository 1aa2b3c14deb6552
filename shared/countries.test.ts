import { describe, expect, it } from 'vitest';
import { COUNTRY_CODES, isCountryCode } from './countries.ts';
import { countryCode } from './schemas/common.ts';

describe('country codes', () => {
  it('are the 249 assigned ones, each once and in order', () => {
    expect(COUNTRY_CODES).toHaveLength(249);
    expect(new Set(COUNTRY_CODES).size).toBe(249);
    expect([...COUNTRY_CODES].sort()).toEqual([...COUNTRY_CODES]);
  });

  it('each name a country that the language data knows', () => {
    const names = new Intl.DisplayNames(['en'], { type: 'region', fallback: 'none' });
    expect(COUNTRY_CODES.filter((code) => names.of(code) === undefined)).toEqual([]);
  });

  it.each(['ZZ', 'XK', 'UK', 'EU', 'AA', 'us', 'USA', ''])('do not take %j', (code) => {
    expect(isCountryCode(code)).toBe(false);
    expect(countryCode.safeParse(code).success).toBe(false);
  });

  it.each(['US', 'GB', 'AX', 'ZW'])('take %s', (code) => {
    expect(isCountryCode(code)).toBe(true);
    expect(countryCode.parse(code)).toBe(code);
  });
});
