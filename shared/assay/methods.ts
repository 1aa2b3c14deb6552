import { dec, type Dec } from '../decimal.ts';
import type { Metal } from '../metals.ts';

/** Keys of the assay methods, in the order in which they are offered. */
export const ASSAY_METHOD_KEYS = [
  'fire_assay',
  'titration',
  'icp_pgm',
  'gravimetric_pgm',
  'difference',
  'xrf',
  'density',
  'touchstone',
  'none',
] as const;

/** The key of an assay method. */
export type AssayMethodKey = (typeof ASSAY_METHOD_KEYS)[number];

/** Inclusive range of a method for one metal, in ‰. */
export type PermilleRange = { readonly low: string; readonly high: string };

/** One assay method: where it applies and what to expect of it. */
export type AssayMethod = {
  readonly key: AssayMethodKey;
  readonly name: string;
  /** Standard documents that describe it; null where there is none. */
  readonly standard: string | null;
  /** Metals it applies to with the range in which it may be used. */
  readonly ranges: Readonly<Partial<Record<Metal, PermilleRange>>>;
  /** Where the ranges come from. */
  readonly rangeSource: string;
  /** Expanded uncertainty (k = 2) in ‰ that is assumed when none is given. All from memory. */
  readonly defaultExpandedPermille: string;
  /** True when only the surface is seen, so that a plated or filled piece deceives. */
  readonly isSurfaceOnly: boolean;
};

const ANY: PermilleRange = { low: '0', high: '1000' };
const ALL_METALS = { Au: ANY, Ag: ANY, Pt: ANY, Pd: ANY } as const;

/** The one table of assay methods. Default uncertainties are from memory and shown as assumed. */
export const ASSAY_METHODS: Readonly<Record<AssayMethodKey, AssayMethod>> = {
  fire_assay: {
    key: 'fire_assay',
    name: 'Fire assay (cupellation)',
    standard: 'ISO 11426; ASTM E1335',
    ranges: { Au: { low: '100', high: '999.5' }, Ag: { low: '10', high: '995' } },
    rangeSource: 'Gold: ISO 11426:2021 scope. Silver: ASTM E1335 scope, 1 % to 99.5 %.',
    defaultExpandedPermille: '0.5',
    isSurfaceOnly: false,
  },
  titration: {
    key: 'titration',
    name: 'Potentiometric titration',
    standard: 'ISO 11427; ISO 13756',
    ranges: { Ag: { low: '50', high: '990' } },
    rangeSource: 'ISO 13756:2024 scope; above it the difference method is used.',
    defaultExpandedPermille: '1',
    isSurfaceOnly: false,
  },
  icp_pgm: {
    key: 'icp_pgm',
    name: 'ICP-OES with internal standard',
    standard: 'ISO 11494 (Pt); ISO 11495 (Pd)',
    ranges: { Pt: ANY, Pd: ANY },
    rangeSource: 'No range confirmed.',
    defaultExpandedPermille: '3',
    isSurfaceOnly: false,
  },
  gravimetric_pgm: {
    key: 'gravimetric_pgm',
    name: 'Gravimetric precipitation',
    standard: 'ISO 11210 (Pt); ISO 11490 (Pd)',
    ranges: { Pt: ANY, Pd: ANY },
    rangeSource: 'No range confirmed.',
    defaultExpandedPermille: '3',
    isSurfaceOnly: false,
  },
  difference: {
    key: 'difference',
    name: 'Difference method, high purity',
    standard: 'ISO 15093 (Au, Pt, Pd); ISO 15096 (Ag); ISO 18214',
    ranges: {
      Au: { low: '999', high: '1000' },
      Ag: { low: '990', high: '1000' },
      Pt: { low: '999', high: '1000' },
      Pd: { low: '999', high: '1000' },
    },
    rangeSource: 'ISO 18214:2024 scope, 999 ‰ and above; silver from where titration ends, ISO 13756:2024.',
    defaultExpandedPermille: '0.05',
    isSurfaceOnly: false,
  },
  xrf: {
    key: 'xrf',
    name: 'X-ray fluorescence screen',
    standard: 'ISO 23345',
    ranges: ALL_METALS,
    rangeSource: 'No range confirmed; it sees the outermost tens of micrometres only.',
    defaultExpandedPermille: '5',
    isSurfaceOnly: true,
  },
  density: {
    key: 'density',
    name: 'Density',
    standard: null,
    ranges: ALL_METALS,
    rangeSource: 'No standard method: a screen that can reject, never prove.',
    defaultExpandedPermille: '30',
    isSurfaceOnly: false,
  },
  touchstone: {
    key: 'touchstone',
    name: 'Touchstone',
    standard: null,
    ranges: { Au: ANY, Ag: ANY },
    rangeSource: 'No standard method.',
    defaultExpandedPermille: '15',
    isSurfaceOnly: true,
  },
  none: {
    key: 'none',
    name: 'No method named',
    standard: null,
    ranges: ALL_METALS,
    rangeSource: 'Nothing is claimed.',
    defaultExpandedPermille: '5',
    isSurfaceOnly: false,
  },
};

/** True for a known method key. */
export function isAssayMethodKey(key: unknown): key is AssayMethodKey {
  return (ASSAY_METHOD_KEYS as readonly unknown[]).includes(key);
}

/** Default expanded uncertainty (k = 2) of a method in ‰, to be labelled assumed. */
export function defaultExpandedPermille(method: AssayMethodKey): Dec {
  return dec(ASSAY_METHODS[method].defaultExpandedPermille);
}

/** True when the method is not for this metal, or the fineness (‰) lies outside the method's range. A warning only. */
export function isOutsideRange(method: AssayMethodKey, metal: Metal, permille: Dec): boolean {
  const range = ASSAY_METHODS[method].ranges[metal];
  return range === undefined || permille.lt(range.low) || permille.gt(range.high);
}
