import { lastDigitOf } from '../decimal.ts';
import { GRAMS_PER_UNIT, toGrams, type MassEntry } from '../mass.ts';

/** How well a lot's assay is backed, best first. */
export const EVIDENCE_GRADES = ['certified', 'examined', 'declared'] as const;

/** An evidence grade. */
export type EvidenceGrade = (typeof EVIDENCE_GRADES)[number];

/** How a grade is worded. */
export const EVIDENCE_GRADE_LABELS: Readonly<Record<EvidenceGrade, string>> = {
  certified: 'Certified',
  examined: 'Examined',
  declared: 'Declared',
};

/** What each grade means, for a reader. */
export const EVIDENCE_GRADE_MEANINGS: Readonly<Record<EvidenceGrade, string>> = {
  certified:
    'Report of an accredited laboratory that examined or sampled this piece; compared and confirmed by the desk. The metal was not tested by Scruple.',
  examined: 'Other evidence that the desk looked at. The metal was not tested by Scruple.',
  declared: 'The seller’s word.',
};

/** What the desk has done: nothing, looked at the evidence, or verified the report with the laboratory. */
export type DeskFinding = 'none' | 'looked' | 'verified';

/** A report as entered. Dates are ISO calendar days (`2026-12-01`). */
export type ReportEvidence = {
  /** The laboratory on our register, or null when it is not on it. Its accreditation holds on both days inclusive. */
  readonly laboratory: { readonly accreditedFrom: string | null; readonly accreditedUntil: string } | null;
  readonly issuedOn: string;
  /** Who took the sample, or that the laboratory examined the whole piece. */
  readonly sampling: 'laboratory' | 'whole_piece' | 'customer' | 'not_stated';
  readonly mass: MassEntry | null;
  readonly mark: string | null;
};

/** What the grade follows from. */
export type Evidence = {
  readonly desk: DeskFinding;
  readonly report: ReportEvidence | null;
  readonly lot: { readonly gross: MassEntry; readonly mark: string | null };
};

/** What a report lacks for the grade `certified`. */
export type EvidenceGap =
  | 'no-report'
  | 'laboratory-not-registered'
  | 'accreditation-not-valid'
  | 'sampling-does-not-cover'
  | 'neither-mass-nor-mark'
  | 'not-verified';

/** Words for each gap. */
export const EVIDENCE_GAP_LABELS: Readonly<Record<EvidenceGap, string>> = {
  'no-report': 'There is no report of a laboratory.',
  'laboratory-not-registered': 'The laboratory is not on our register.',
  'accreditation-not-valid': 'The laboratory’s accreditation was not valid on the day of issue.',
  'sampling-does-not-cover': 'The laboratory neither examined nor sampled the piece itself.',
  'neither-mass-nor-mark': 'Neither the mass nor the mark on the report is the lot’s.',
  'not-verified': 'The desk has not verified the report.',
};

/**
 * Grade of a lot's evidence. `certified` needs everything at once: an accredited laboratory on the register, valid on
 * the day of issue; the piece itself examined or sampled by it; mass or mark that is the lot's; verified by the desk.
 * Else `examined` when the desk looked, `declared` when it did not. `gaps` says what `certified` lacks.
 */
export function gradeEvidence(evidence: Evidence): { grade: EvidenceGrade; gaps: EvidenceGap[] } {
  const gaps = reportGaps(evidence);
  if (evidence.desk !== 'verified') gaps.push('not-verified');
  if (gaps.length === 0) return { grade: 'certified', gaps };
  return { grade: evidence.desk === 'none' ? 'declared' : 'examined', gaps };
}

function reportGaps({ report, lot }: Evidence): EvidenceGap[] {
  if (!report) return ['no-report'];
  const gaps: EvidenceGap[] = [];
  if (!report.laboratory) {
    gaps.push('laboratory-not-registered');
  } else if (!isValidOn(report.laboratory, report.issuedOn)) {
    gaps.push('accreditation-not-valid');
  }
  if (report.sampling !== 'laboratory' && report.sampling !== 'whole_piece')
    gaps.push('sampling-does-not-cover');
  const massMatches = report.mass !== null && massesAgree(report.mass, lot.gross);
  if (!massMatches && !marksAgree(report.mark, lot.mark)) gaps.push('neither-mass-nor-mark');
  return gaps;
}

function isValidOn(laboratory: NonNullable<ReportEvidence['laboratory']>, day: string): boolean {
  const { accreditedFrom, accreditedUntil } = laboratory;
  return (accreditedFrom === null || accreditedFrom <= day) && day <= accreditedUntil;
}

/**
 * True when two masses as entered are the same piece on two balances: they differ by no more than one unit of the last
 * digit of each together. Compared exactly in grams. Throws MeasureError of `toGrams`.
 */
export function massesAgree(left: MassEntry, right: MassEntry): boolean {
  const step = (entry: MassEntry) => lastDigitOf(entry.value).times(GRAMS_PER_UNIT[entry.unit]);
  const difference = toGrams(left).minus(toGrams(right)).abs();
  return difference.lte(step(left).plus(step(right)));
}

/** True when both marks are given and are the same but for blanks, hyphens and case. */
export function marksAgree(left: string | null, right: string | null): boolean {
  const tidy = (mark: string | null) =>
    (mark ?? '')
      .normalize('NFKC')
      .replace(/[\s-]+/gu, '')
      .toUpperCase();
  return tidy(left) !== '' && tidy(left) === tidy(right);
}
