import type { z } from 'zod';
import { massesAgree } from '#shared/assay/evidence.ts';
import { ASSAY_METHODS, isAssayMethodKey } from '#shared/assay/methods.ts';
import { dec, plain } from '#shared/decimal.ts';
import { formatGrams, massText, toGrams, type MassEntry } from '#shared/mass.ts';
import type { comparisonRow } from '#shared/schemas/desk.ts';
import { nameOfElement } from './element-words.ts';

export type ComparisonRow = z.infer<typeof comparisonRow>;

/** One element as the report states it. Fineness and uncertainty in ‰, plain decimals. */
export type ReportedResult = {
  element: string;
  finenessPermille: string;
  uncertaintyPermille: string | null;
  method: string;
};
/** One element as the lot states it. */
export type StatedContent = {
  element: string;
  finenessPermille: string;
  uncertaintyPermille: string;
  isUncertaintyAssumed: boolean;
  method: string;
  isPaidFor: boolean;
};

export type Comparison = {
  form: string;
  itemDescription: string;
  reportMass: MassEntry | null;
  lotMass: MassEntry;
  itemMark: string | null;
  results: readonly ReportedResult[];
  contents: readonly StatedContent[];
};

const ABSENT = '–';
const FORM_WORDS = {
  button: /\bbuttons?\b/i,
  bar: /\b(bars?|ingots?)\b/i,
  grain: /\b(grains?|granules?|shot)\b/i,
};

const permilleText = (value: string) => `${plain(dec(value))} ‰`;
const methodName = (key: string) => (isAssayMethodKey(key) ? ASSAY_METHODS[key].name : key);

function massRow({ reportMass, lotMass }: Comparison): ComparisonRow {
  const onLot = massText(lotMass);
  if (reportMass === null) {
    const note = 'The report names no mass; only its mark can tie it to the piece.';
    return { label: 'Mass', onReport: ABSENT, onLot, differs: true, isByEye: false, note };
  }
  const onReport = massText(reportMass);
  const gap = toGrams(reportMass).minus(toGrams(lotMass)).abs();
  const differs = !massesAgree(reportMass, lotMass);
  if (gap.isZero()) return { label: 'Mass', onReport, onLot, differs, isByEye: false, note: null };
  const note = differs
    ? `Apart by ${formatGrams(gap)} g, more than the last digits allow.`
    : 'Within the last digits of the two balances.';
  return { label: 'Mass', onReport, onLot, differs, isByEye: false, note };
}

function formRow({ form, itemDescription }: Comparison): ComparisonRow {
  const named = Object.entries(FORM_WORDS).filter(([, word]) => word.test(itemDescription));
  const differs = named.length > 0 && !named.some(([name]) => name === form);
  return {
    label: 'Form',
    onReport: itemDescription === '' ? ABSENT : itemDescription,
    onLot: form,
    differs,
    isByEye: !differs,
    note: differs ? 'The report names another form.' : 'Compare with the photos.',
  };
}

function markRow({ itemMark }: Comparison): ComparisonRow {
  return {
    label: 'Mark',
    onReport: itemMark ?? ABSENT,
    onLot: 'see the photos',
    differs: false,
    isByEye: itemMark !== null,
    note: itemMark === null ? 'The report names no mark.' : 'Look for this mark on the photos.',
  };
}

function finenessRow(label: string, result: ReportedResult, content: StatedContent): ComparisonRow {
  const gap = dec(content.finenessPermille).minus(result.finenessPermille);
  const note = gap.isZero()
    ? null
    : `The lot states ${plain(gap.abs())} ‰ ${gap.gt(0) ? 'more' : 'less'} than the report.`;
  return {
    label: `${label}: fineness`,
    onReport: permilleText(result.finenessPermille),
    onLot: permilleText(content.finenessPermille),
    differs: !gap.isZero(),
    isByEye: false,
    note,
  };
}

function uncertaintyRow(label: string, result: ReportedResult, content: StatedContent): ComparisonRow {
  const onLot = `± ${permilleText(content.uncertaintyPermille)}${content.isUncertaintyAssumed ? ', assumed' : ''}`;
  const name = `${label}: uncertainty`;
  if (result.uncertaintyPermille === null) {
    const note = content.isUncertaintyAssumed
      ? 'The report states none; the method’s default is labelled as assumed.'
      : 'The report states none, yet the lot does not say that its own is assumed.';
    return {
      label: name,
      onReport: ABSENT,
      onLot,
      differs: !content.isUncertaintyAssumed,
      isByEye: false,
      note,
    };
  }
  const gap = dec(content.uncertaintyPermille).minus(result.uncertaintyPermille);
  const note = gap.isZero()
    ? null
    : gap.lt(0)
      ? 'The lot claims to be surer than the report.'
      : 'The lot is less sure than the report.';
  const onReport = `± ${permilleText(result.uncertaintyPermille)}`;
  return { label: name, onReport, onLot, differs: !gap.isZero(), isByEye: false, note };
}

function methodRow(label: string, result: ReportedResult, content: StatedContent): ComparisonRow {
  return {
    label: `${label}: method`,
    onReport: methodName(result.method),
    onLot: methodName(content.method),
    differs: result.method !== content.method,
    isByEye: false,
    note: null,
  };
}

function onlyOnOneSide(
  label: string,
  result: ReportedResult | undefined,
  content: StatedContent | undefined,
): ComparisonRow {
  const paid = content?.isPaidFor === true ? ', although it is paid for' : '';
  return {
    label: `${label}: fineness`,
    onReport: result === undefined ? ABSENT : permilleText(result.finenessPermille),
    onLot: content === undefined ? ABSENT : permilleText(content.finenessPermille),
    differs: true,
    isByEye: false,
    note: result === undefined ? `Not on the report${paid}.` : 'On the report, left out of the lot.',
  };
}

function elementRows(element: string, { results, contents }: Comparison): ComparisonRow[] {
  const label = nameOfElement(element);
  const result = results.find((row) => row.element === element);
  const content = contents.find((row) => row.element === element);
  if (result === undefined || content === undefined) return [onlyOnOneSide(label, result, content)];
  return [
    finenessRow(label, result, content),
    uncertaintyRow(label, result, content),
    methodRow(label, result, content),
  ];
}

/** The report's figures beside the lot's, line by line; a difference is marked and said in words. */
export function compareReport(comparison: Comparison): ComparisonRow[] {
  const elements = new Set([...comparison.contents, ...comparison.results].map((row) => row.element));
  return [
    massRow(comparison),
    markRow(comparison),
    formRow(comparison),
    ...[...elements].flatMap((element) => elementRows(element, comparison)),
  ];
}

/**
 * Elements of which the lot claims more than the report gives, or which it is paid for without a result on the report.
 * Such a lot cannot be verified: what is certified would not be what is sold.
 */
export function claimsBeyondReport({
  results,
  contents,
}: Pick<Comparison, 'results' | 'contents'>): string[] {
  return contents
    .filter((content) => content.isPaidFor)
    .filter((content) => {
      const result = results.find((row) => row.element === content.element);
      return result === undefined || dec(content.finenessPermille).gt(result.finenessPermille);
    })
    .map((content) => content.element);
}
