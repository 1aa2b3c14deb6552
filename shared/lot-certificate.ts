import { isAssayMethodKey, type AssayMethodKey } from './assay/methods.ts';
import { dayOf, isCalendarDay } from './calendar-day.ts';
import { invariant, IssueCollector, MeasureError } from './domain-error.ts';
import { assertTotalWithinWhole, toFraction, type FinenessEntry } from './fineness.ts';
import { readElement, readFineness, readMass } from './lot-contents.ts';
import { toGrams, type MassEntry } from './mass.ts';
import { elementName, isMetal, type Metal, type OtherElement } from './metals.ts';
import { SAMPLING_VALUES, type DraftCertificate } from './schemas/lots.ts';

/** One result of a report, read. */
export type ParsedResult = {
  element: Metal | OtherElement;
  fineness: FinenessEntry;
  uncertainty: FinenessEntry | null;
  method: AssayMethodKey;
};

/** A report as entered, read. Days are ISO calendar days. */
export type ParsedCertificate = {
  fileId: string;
  laboratoryId: string | null;
  laboratoryName: string;
  number: string;
  issuedOn: string;
  receivedOn: string | null;
  testedOn: string | null;
  sampling: (typeof SAMPLING_VALUES)[number];
  itemDescription: string;
  itemMass: MassEntry | null;
  itemMark: string | null;
  authorisedBy: string;
  results: ParsedResult[];
};

const AT = '/certificate';

/**
 * Reads the fields of a certificate (ISO/IEC 17025:2017 clause 7.8.2.1) that a stated assay rests on. `paid` are the
 * metals that the lot is paid for: each needs its result on the report. All pointers lie under `/certificate`.
 * Throws one MeasureError with every issue.
 */
export function parseCertificate(
  draft: DraftCertificate,
  paid: readonly string[],
  now: Date,
): ParsedCertificate {
  const issues = new IssueCollector();
  if (draft.fileId === null) issues.add('file-missing', `${AT}/fileId`, 'Upload the certificate.');
  if (draft.laboratoryName.trim() === '') {
    issues.add('laboratory-missing', `${AT}/laboratoryName`, 'Name the laboratory.');
  }
  if (draft.number.trim() === '') issues.add('number-missing', `${AT}/number`, 'Enter the report number.');
  const dates = issues.attempt(() => readDates(draft, now));
  const sampling = SAMPLING_VALUES.find((known) => known === draft.sampling);
  if (!sampling) issues.add('sampling-missing', `${AT}/sampling`, 'Say who took the sample.');
  const item = issues.attempt(() => readItem(draft));
  const results = issues.attempt(() => readResults(draft, paid));
  issues.finish();
  invariant(
    draft.fileId !== null && dates && sampling && item && results,
    'what cannot be read is always reported',
  );
  return {
    fileId: draft.fileId,
    laboratoryId: draft.laboratoryId,
    laboratoryName: draft.laboratoryName.trim(),
    number: draft.number.trim(),
    ...dates,
    sampling,
    itemDescription: draft.itemDescription.trim(),
    ...item,
    authorisedBy: draft.authorisedBy.trim(),
    results,
  };
}

type Dates = Pick<ParsedCertificate, 'issuedOn' | 'receivedOn' | 'testedOn'>;

function readDates(draft: DraftCertificate, now: Date): Dates {
  const issues = new IssueCollector();
  const issuedOn = issues.attempt(() => {
    if (draft.issuedOn.trim() === '') {
      throw new MeasureError('date-missing', `${AT}/issuedOn`, 'Enter the date of issue.');
    }
    return readPastDay(draft.issuedOn, `${AT}/issuedOn`, now);
  });
  const optional = (text: string, field: string) =>
    issues.attempt(() => ({ day: text.trim() === '' ? null : readPastDay(text, field, now) }));
  const receivedOn = optional(draft.receivedOn, `${AT}/receivedOn`);
  const testedOn = optional(draft.testedOn, `${AT}/testedOn`);
  issues.finish();
  invariant(issuedOn !== undefined && receivedOn && testedOn, 'what cannot be read is always reported');
  return { issuedOn, receivedOn: receivedOn.day, testedOn: testedOn.day };
}

function readPastDay(text: string, field: string, now: Date): string {
  const day = text.trim();
  if (!isCalendarDay(day)) {
    throw new MeasureError('date-invalid', field, 'Write a date such as 2026-11-30.');
  }
  if (day > dayOf(now)) throw new MeasureError('date-in-future', field, 'This day has not come yet.');
  return day;
}

function readItem(draft: DraftCertificate): Pick<ParsedCertificate, 'itemMass' | 'itemMark'> {
  const mark = draft.itemMark.trim();
  const hasMass = draft.itemMass.value.trim() !== '';
  if (!hasMass && mark === '') {
    throw new MeasureError(
      'item-not-identified',
      `${AT}/itemMass/value`,
      'Enter the mass or the mark that the report gives for the piece.',
    );
  }
  if (!hasMass) return { itemMass: null, itemMark: mark };
  const itemMass = readMass(draft.itemMass, `${AT}/itemMass`, 'Enter the mass on the report.');
  toGrams(itemMass, `${AT}/itemMass`);
  return { itemMass, itemMark: mark === '' ? null : mark };
}

function readResults(draft: DraftCertificate, paid: readonly string[]): ParsedResult[] {
  const issues = new IssueCollector();
  const field = `${AT}/results`;
  if (draft.results.length === 0) {
    issues.add('results-missing', field, 'Enter the results of the report.');
  }
  const results = draft.results.flatMap((_, index) => {
    const result = issues.attempt(() => readResult(draft, index));
    return result ? [result] : [];
  });
  issues.attempt(() =>
    assertTotalWithinWhole(
      results.map((result) => toFraction(result.fineness)),
      field,
    ),
  );
  if (draft.results.length > 0) {
    for (const metal of new Set(paid)) {
      if (isMetal(metal) && !draft.results.some((result) => result.element === metal)) {
        const name = elementName(metal).toLowerCase();
        issues.add('result-missing', field, `The report gives no result for ${name}, which is paid for.`);
      }
    }
  }
  issues.finish();
  return results;
}

function readResult(draft: DraftCertificate, index: number): ParsedResult {
  const row = draft.results[index]!;
  const field = `${AT}/results/${index}`;
  const issues = new IssueCollector();
  const element = issues.attempt(() => readElement(row.element, `${field}/element`));
  if (element && draft.results.findIndex((other) => other.element === element) !== index) {
    issues.add('metal-repeated', `${field}/element`, `${elementName(element)} is given twice.`);
  }
  const fineness = issues.attempt(() => {
    const entry = readFineness(row.fineness, `${field}/fineness`, 'Enter the result.');
    toFraction(entry, `${field}/fineness`);
    return entry;
  });
  const uncertainty = issues.attempt(() => {
    if (row.uncertainty.value.trim() === '') return { entry: null };
    const entry = readFineness(row.uncertainty, `${field}/uncertainty`, 'Enter the uncertainty.');
    toFraction(entry, `${field}/uncertainty`);
    return { entry };
  });
  const method = row.method === '' ? 'none' : row.method;
  if (!isAssayMethodKey(method)) {
    issues.add('method-unknown', `${field}/method`, 'Choose one of the methods listed.');
  }
  issues.finish();
  invariant(element && fineness && uncertainty, 'what cannot be read is always reported');
  return {
    element,
    fineness,
    uncertainty: uncertainty.entry,
    method: isAssayMethodKey(method) ? method : 'none',
  };
}
