import { describe, expect, it } from 'vitest';
import { MeasureError } from '../domain-error.ts';
import {
  EVIDENCE_GAP_LABELS,
  EVIDENCE_GRADES,
  EVIDENCE_GRADE_LABELS,
  EVIDENCE_GRADE_MEANINGS,
  gradeEvidence,
  marksAgree,
  massesAgree,
  type Evidence,
  type ReportEvidence,
} from './evidence.ts';

const REPORT: ReportEvidence = {
  laboratory: { accreditedFrom: '2024-03-01', accreditedUntil: '2027-02-28' },
  issuedOn: '2026-11-20',
  sampling: 'laboratory',
  mass: { value: '31.05', unit: 'g' },
  mark: null,
};

const VERIFIED: Evidence = {
  desk: 'verified',
  report: REPORT,
  lot: { gross: { value: '31.05', unit: 'g' }, mark: 'HF-0412' },
};

const withReport = (change: Partial<ReportEvidence>): Evidence => ({
  ...VERIFIED,
  report: { ...REPORT, ...change },
});

describe('grade', () => {
  it('is certified when everything holds at once', () => {
    expect(gradeEvidence(VERIFIED)).toEqual({ grade: 'certified', gaps: [] });
  });

  it('takes the whole piece for a sample, and the mark for the mass', () => {
    expect(gradeEvidence(withReport({ sampling: 'whole_piece' })).grade).toBe('certified');
    expect(gradeEvidence(withReport({ mass: null, mark: 'hf 0412' })).grade).toBe('certified');
    expect(gradeEvidence(withReport({ mass: { value: '30.10', unit: 'g' }, mark: 'HF-0412' })).grade).toBe(
      'certified',
    );
  });

  it.each<[string, Partial<ReportEvidence>, string]>([
    ['a laboratory that is not on the register', { laboratory: null }, 'laboratory-not-registered'],
    ['an accreditation that ran out the day before', { issuedOn: '2027-03-01' }, 'accreditation-not-valid'],
    ['an accreditation that had not begun', { issuedOn: '2024-02-29' }, 'accreditation-not-valid'],
    ['a sample sent in by the customer', { sampling: 'customer' }, 'sampling-does-not-cover'],
    ['sampling not stated', { sampling: 'not_stated' }, 'sampling-does-not-cover'],
    ['another mass and no mark', { mass: { value: '31.20', unit: 'g' } }, 'neither-mass-nor-mark'],
    ['neither mass nor mark', { mass: null }, 'neither-mass-nor-mark'],
    ['another mark', { mass: null, mark: 'HF-0413' }, 'neither-mass-nor-mark'],
  ])('is only examined with %s', (_, change, gap) => {
    expect(gradeEvidence(withReport(change))).toEqual({ grade: 'examined', gaps: [gap] });
  });

  it.each(['2024-03-01', '2027-02-28'])(
    'holds on the first and last day of the accreditation, %s',
    (issuedOn) => {
      expect(gradeEvidence(withReport({ issuedOn })).grade).toBe('certified');
    },
  );

  it('takes an accreditation without a first day as begun', () => {
    const laboratory = { accreditedFrom: null, accreditedUntil: '2026-11-20' };
    expect(gradeEvidence(withReport({ laboratory })).grade).toBe('certified');
  });

  it('is examined when the desk looked and declared when it did not', () => {
    expect(gradeEvidence({ ...VERIFIED, desk: 'looked' })).toEqual({
      grade: 'examined',
      gaps: ['not-verified'],
    });
    expect(gradeEvidence({ ...VERIFIED, desk: 'none' })).toEqual({
      grade: 'declared',
      gaps: ['not-verified'],
    });
    expect(gradeEvidence({ ...VERIFIED, report: null, desk: 'looked' }).grade).toBe('examined');
    expect(gradeEvidence({ ...VERIFIED, report: null, desk: 'none' })).toEqual({
      grade: 'declared',
      gaps: ['no-report', 'not-verified'],
    });
  });

  it('names every gap, with words for each', () => {
    const bare = withReport({ laboratory: null, sampling: 'customer', mass: null });
    const { gaps } = gradeEvidence({ ...bare, desk: 'looked' });
    expect(gaps).toEqual([
      'laboratory-not-registered',
      'sampling-does-not-cover',
      'neither-mass-nor-mark',
      'not-verified',
    ]);
    for (const gap of gaps) expect(EVIDENCE_GAP_LABELS[gap]).toMatch(/\.$/);
  });

  it('claims for no grade that the metal was tested', () => {
    expect(EVIDENCE_GRADES.map((grade) => EVIDENCE_GRADE_LABELS[grade])).toEqual([
      'Certified',
      'Examined',
      'Declared',
    ]);
    expect(EVIDENCE_GRADE_MEANINGS.certified).toContain('not tested by Scruple');
    expect(EVIDENCE_GRADE_MEANINGS.examined).toContain('not tested by Scruple');
  });
});

describe('the same piece on two balances', () => {
  it.each([
    ['31.05', '31.05', true],
    ['31.05', '31.07', true],
    ['31.05', '31.08', false],
    ['31.05', '31.1', true],
    ['31.05', '31.163', false],
    ['31', '32.0', true],
  ])('agrees on %s g and %s g: %s', (left, right, expected) => {
    expect(massesAgree({ value: left, unit: 'g' }, { value: right, unit: 'g' })).toBe(expected);
    expect(massesAgree({ value: right, unit: 'g' }, { value: left, unit: 'g' })).toBe(expected);
  });

  it('compares across units in exact grams', () => {
    expect(massesAgree({ value: '1.000', unit: 'ozt' }, { value: '31.10', unit: 'g' })).toBe(true);
    expect(massesAgree({ value: '1.000', unit: 'oz' }, { value: '31.10', unit: 'g' })).toBe(false);
  });

  it('refuses a mass that is none', () => {
    expect(() => massesAgree({ value: '0', unit: 'g' }, { value: '1', unit: 'g' })).toThrow(MeasureError);
  });

  it('compares marks without regard to blanks, hyphens and case', () => {
    expect(marksAgree('HF 0412', 'hf-0412')).toBe(true);
    expect(marksAgree('HF-0412', 'HF-0413')).toBe(false);
    expect(marksAgree('', '')).toBe(false);
    expect(marksAgree(' - ', null)).toBe(false);
    expect(marksAgree(null, null)).toBe(false);
  });
});
