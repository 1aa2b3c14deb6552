import { describe, expect, it } from 'vitest';
import { dec } from '../decimal.ts';
import {
  METALS,
  METAL_NAMES,
  OTHER_ELEMENTS,
  elementName,
  isMetal,
  isOtherElement,
  type Metal,
} from '../metals.ts';
import {
  ASSAY_METHODS,
  ASSAY_METHOD_KEYS,
  defaultExpandedPermille,
  isAssayMethodKey,
  isOutsideRange,
  type AssayMethodKey,
} from './methods.ts';

describe('the table of methods', () => {
  it('has a complete row under every key', () => {
    expect(Object.keys(ASSAY_METHODS)).toEqual([...ASSAY_METHOD_KEYS]);
    for (const key of ASSAY_METHOD_KEYS) {
      const method = ASSAY_METHODS[key];
      expect(method.key).toBe(key);
      expect(method.name).not.toBe('');
      expect(method.rangeSource).not.toBe('');
      for (const range of Object.values(method.ranges)) expect(dec(range.low).lt(range.high)).toBe(true);
    }
  });

  it('has a name of its own for every method', () => {
    const names = ASSAY_METHOD_KEYS.map((key) => ASSAY_METHODS[key].name);
    expect(new Set(names).size).toBe(names.length);
  });

  it.each<[AssayMethodKey, string]>([
    ['fire_assay', '0.5'],
    ['titration', '1'],
    ['icp_pgm', '3'],
    ['gravimetric_pgm', '3'],
    ['difference', '0.05'],
    ['xrf', '5'],
    ['density', '30'],
    ['touchstone', '15'],
    ['none', '5'],
  ])('assumes for %s an expanded uncertainty of %s ‰ (from memory)', (key, permille) => {
    expect(defaultExpandedPermille(key).toFixed()).toBe(permille);
  });

  it('knows which methods see the surface only', () => {
    expect(ASSAY_METHOD_KEYS.filter((key) => ASSAY_METHODS[key].isSurfaceOnly)).toEqual([
      'xrf',
      'touchstone',
    ]);
  });

  it('tells its keys from other text', () => {
    expect(isAssayMethodKey('fire_assay')).toBe(true);
    expect(isAssayMethodKey('toString')).toBe(false);
    expect(isAssayMethodKey(null)).toBe(false);
  });
});

describe('range of a method', () => {
  it.each<[AssayMethodKey, Metal, string, boolean, string]>([
    ['fire_assay', 'Au', '100', false, 'ISO 11426:2021 scope, read'],
    ['fire_assay', 'Au', '99.9', true, 'ISO 11426:2021 scope, read'],
    ['fire_assay', 'Au', '999.5', false, 'ISO 11426:2021 scope, read'],
    ['fire_assay', 'Au', '999.6', true, 'ISO 11426:2021 scope, read'],
    ['fire_assay', 'Ag', '995', false, 'ASTM E1335 scope, read'],
    ['fire_assay', 'Ag', '9.9', true, 'ASTM E1335 scope, read'],
    ['fire_assay', 'Pt', '950', true, 'not a method for platinum'],
    ['titration', 'Ag', '50', false, 'ISO 13756:2024 scope, read'],
    ['titration', 'Ag', '990', false, 'ISO 13756:2024 scope, read'],
    ['titration', 'Ag', '990.1', true, 'ISO 13756:2024 scope, read'],
    ['titration', 'Au', '500', true, 'not a method for gold'],
    ['difference', 'Au', '999.9', false, 'ISO 15093 and ISO 18214:2024 scopes, read'],
    ['difference', 'Au', '998.9', true, 'ISO 18214:2024 scope, read'],
    ['icp_pgm', 'Pd', '950', false, 'ISO 11495'],
    ['icp_pgm', 'Ag', '925', true, 'not a method for silver'],
    ['xrf', 'Au', '585', false, 'no range confirmed'],
    ['none', 'Pd', '1', false, 'nothing is claimed'],
  ])('of %s for %s at %s ‰ is left: %s (%s)', (method, metal, permille, isOutside) => {
    expect(isOutsideRange(method, metal, dec(permille))).toBe(isOutside);
  });
});

describe('metals', () => {
  it('has a name for each, and keeps the two lists apart', () => {
    expect(METALS.map((metal) => METAL_NAMES[metal])).toEqual(['Gold', 'Silver', 'Platinum', 'Palladium']);
    for (const element of OTHER_ELEMENTS) {
      expect(isMetal(element)).toBe(false);
      expect(isOtherElement(element)).toBe(true);
      expect(elementName(element)).toMatch(/^[A-Z][a-z]+$/);
    }
    expect(isOtherElement('Au')).toBe(false);
    expect(isOtherElement('constructor')).toBe(false);
    expect(elementName('Pd')).toBe('Palladium');
    expect(elementName('Rh')).toBe('Rhodium');
  });
});
