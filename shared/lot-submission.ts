import { invariant, IssueCollector, MeasureError, type MeasureIssue } from './domain-error.ts';
import { dayOf, daysLater, isCalendarDay } from './calendar-day.ts';
import { isCountryCode } from './countries.ts';
import { DESCRIPTION_LENGTH_MAX, LOT_OPEN_DAYS_MAX, SHIPPING_MINOR_MAX, TITLE_LENGTH_MAX } from './limits.ts';
import { fromAmount, groupThousands, minorToAmount } from './money.ts';
import type { MassEntry } from './mass.ts';
import { readPricing, type ParsedPricing } from './lot-pricing.ts';
import { parseCertificate, type ParsedCertificate } from './lot-certificate.ts';
import { readContent, readMass } from './lot-contents.ts';
import { REFINED_FORMS, type LotDraft } from './schemas/lots.ts';
import { measureLot } from './settlement/lot-measures.ts';
import { refinedSheet } from './settlement/refined-sheet.ts';
import type { ContentEntry, QuoteRef, RefinedSheetInput } from './settlement/sheet-types.ts';
import { typedDecimal } from './typed-number.ts';

/** A refined form. */
export type RefinedForm = (typeof REFINED_FORMS)[number];

/** One thing that stands between a draft and its submission; `pointer` is a JSON pointer into the draft. */
export type LotProblem = { pointer: string; code: string; message: string };

/** A draft that can be submitted, read: numbers in plain notation with the digits typed, sums in cents. */
export type ParsedLot = ParsedPricing & {
  form: RefinedForm;
  title: string;
  description: string;
  gross: MassEntry;
  readability: MassEntry | null;
  contents: ContentEntry[];
  shippingMinor: bigint;
  destinations: string[];
  /** The last day on which the lot is open; null for as long as is allowed. */
  closesOn: string | null;
  certificate: ParsedCertificate;
};

/** Shortest title that says anything. */
export const TITLE_LENGTH_MIN = 5;

/**
 * Everything that stands between a draft and its submission, at once; with none, the draft read. Pure: `now` is the
 * moment that dates are held against. The same function speaks on the screen and on the server.
 */
export function checkLotDraft(
  draft: LotDraft,
  now: Date,
): { problems: LotProblem[]; value: ParsedLot | null } {
  const issues = new IssueCollector();
  const form = issues.attempt(() => readForm(draft.form));
  const title = issues.attempt(() => readTitle(draft.title));
  const description = issues.attempt(() => readDescription(draft.description));
  const measures = issues.attempt(() => readMeasures(draft));
  const pricing = issues.attempt(() => readPricing(draft));
  const shippingMinor = issues.attempt(() => readShipping(draft.shipping));
  const destinations = issues.attempt(() => readDestinations(draft.destinations));
  const closesOn = issues.attempt(() => ({ day: readClosingDay(draft.closesOn, now) }));
  const paid = draft.contents.filter((content) => content.paidFor).map((content) => content.metal);
  const certificate = issues.attempt(() => parseCertificate(draft.certificate, paid, now));
  issues.attempt(() => readConfirmations(draft));
  const problems = gathered(issues).map(({ field, code, message }) => ({ pointer: field, code, message }));
  if (
    problems.length > 0 ||
    !form ||
    title === undefined ||
    description === undefined ||
    !measures ||
    !pricing ||
    shippingMinor === undefined ||
    !destinations ||
    !closesOn ||
    !certificate
  ) {
    return { problems, value: null };
  }
  const terms = { shippingMinor, destinations, closesOn: closesOn.day };
  return { problems, value: { form, title, description, ...measures, ...pricing, ...terms, certificate } };
}

function gathered(issues: IssueCollector): readonly MeasureIssue[] {
  try {
    issues.finish();
    return [];
  } catch (error) {
    if (error instanceof MeasureError) return error.issues;
    throw error;
  }
}

function readForm(form: string): RefinedForm {
  const found = REFINED_FORMS.find((known) => known === form);
  if (found) return found;
  throw new MeasureError('form-missing', '/form', 'Choose button, bar or grain.');
}

function readTitle(text: string): string {
  const title = text.trim();
  if (title.length < TITLE_LENGTH_MIN) {
    throw new MeasureError(
      'title-too-short',
      '/title',
      `Write a title of at least ${TITLE_LENGTH_MIN} letters.`,
    );
  }
  if (title.length > TITLE_LENGTH_MAX) {
    throw new MeasureError('title-too-long', '/title', `A title has at most ${TITLE_LENGTH_MAX} letters.`);
  }
  return title;
}

function readDescription(text: string): string {
  if (text.length > DESCRIPTION_LENGTH_MAX) {
    throw new MeasureError(
      'description-too-long',
      '/description',
      `Write at most ${DESCRIPTION_LENGTH_MAX} letters.`,
    );
  }
  return text.trim();
}

type Measured = { gross: MassEntry; readability: MassEntry | null; contents: ContentEntry[] };

/** Stands in for what cannot be read, so that the rest is judged all the same. */
const HEAVY: MassEntry = { value: '1000', unit: 'kg' };
const PURE: ContentEntry = {
  metal: 'Au',
  fineness: { value: '1000', unit: 'permille' },
  uncertainty: null,
  method: 'none',
  paidFor: true,
};

/** Reads the numbers as typed, then lets the engine judge all that could be read: one slip does not hide another. */
function readMeasures(draft: LotDraft): Measured {
  const issues = new IssueCollector();
  const gross = issues.attempt(() => readMass(draft.gross, '/gross', 'Enter the gross mass.'));
  const readability = issues.attempt(() => ({ entry: readReadability(draft) }));
  const rows = draft.contents.flatMap((row, index) => {
    const entry = issues.attempt(() => readContent(row, `/contents/${index}`));
    return entry ? [{ entry, index }] : [];
  });
  const contents = rows.map(({ entry }) => entry);
  const isNothingReadable = draft.contents.length > 0 && rows.length === 0;
  issues.attempt(() =>
    withRowsOf(
      rows.map(({ index }) => index),
      () =>
        measureLot({
          gross: gross ?? HEAVY,
          readability: readability?.entry ?? null,
          contents: isNothingReadable ? [PURE] : contents,
        }),
    ),
  );
  if (draft.contents.length > 0 && !draft.contents.some((content) => content.paidFor)) {
    issues.add('nothing-paid-for', '/contents', 'Mark at least one metal as paid for.');
  }
  issues.finish();
  invariant(gross && readability, 'what cannot be read is always reported');
  return { gross, readability: readability.entry, contents };
}

/** The engine counts the rows that it was given; a pointer counts the rows of the draft. */
function withRowsOf<T>(indexes: readonly number[], step: () => T): T {
  try {
    return step();
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    const issues = error.issues.map((issue) => ({
      ...issue,
      field: issue.field.replace(/^\/contents\/(\d+)/, (_, at: string) => {
        const row = indexes.find((__, position) => String(position) === at);
        return `/contents/${row ?? at}`;
      }),
    }));
    throw new MeasureError(error.code, issues[0]?.field ?? error.field, error.message, issues);
  }
}

function readReadability(draft: LotDraft): MassEntry | null {
  if (draft.readability.value.trim() === '') return null;
  return readMass(draft.readability, '/readability', 'Enter the readability of the balance.');
}

function readShipping(text: string): bigint {
  const missing = 'Enter the charge for the insured parcel; 0 if you bear it.';
  const { minor } = fromAmount(typedDecimal(text, '/shipping', missing), '/shipping');
  if (minor < 0n) throw new MeasureError('amount-negative', '/shipping', 'This sum is never below zero.');
  if (minor > SHIPPING_MINOR_MAX) {
    throw new MeasureError(
      'too-large',
      '/shipping',
      `The highest charge for a parcel is US$ ${groupThousands(minorToAmount(SHIPPING_MINOR_MAX))}.`,
    );
  }
  return minor;
}

function readDestinations(codes: readonly string[]): string[] {
  const issues = new IssueCollector();
  if (codes.length === 0) {
    issues.add('destinations-missing', '/destinations', 'Choose at least one country that you ship to.');
  }
  codes.forEach((code, index) => {
    if (!isCountryCode(code)) {
      issues.add('country-unknown', `/destinations/${index}`, 'No country has this code; US is one that is.');
    } else if (codes.indexOf(code) !== index) {
      issues.add('country-repeated', `/destinations/${index}`, `${code} is chosen twice.`);
    }
  });
  issues.finish();
  return [...codes];
}

function readClosingDay(text: string, now: Date): string | null {
  const day = text.trim();
  if (day === '') return null;
  if (!isCalendarDay(day)) {
    throw new MeasureError('date-invalid', '/closesOn', 'Write a date such as 2026-12-31.');
  }
  if (day <= dayOf(now)) {
    throw new MeasureError('date-too-early', '/closesOn', 'Choose a day after today.');
  }
  if (day > dayOf(daysLater(now, LOT_OPEN_DAYS_MAX))) {
    throw new MeasureError(
      'date-too-late',
      '/closesOn',
      `A lot is open for at most ${LOT_OPEN_DAYS_MAX} days.`,
    );
  }
  return day;
}

function readConfirmations(draft: LotDraft): void {
  const issues = new IssueCollector();
  if (!draft.confirmsCautions) {
    issues.add('not-confirmed', '/confirmsCautions', 'Confirm that you have read the cautions.');
  }
  if (!draft.confirmsTitle) {
    issues.add('not-confirmed', '/confirmsTitle', 'Confirm that the metal is yours to sell.');
  }
  issues.finish();
}

/** What the live sheet of a draft is made for; without it, a buyer's estimate. */
export type DraftSheetFor = Pick<RefinedSheetInput, 'audience' | 'commission'>;

/**
 * Input of the estimated sheet of a draft that is still being typed: null until mass, one metal paid for and its quote
 * can be read. A price or parcel that cannot be read yet is left out, so that the melt value already shows.
 */
export function draftSheetInput(
  draft: LotDraft,
  quotes: readonly QuoteRef[],
  { audience, commission }: DraftSheetFor = { audience: 'buyer', commission: null },
): RefinedSheetInput | null {
  const measures = unlessRefused(() => readMeasures(draft));
  if (!measures) return null;
  const price = unlessRefused(() => sheetPriceOf(readPricing({ ...draft, floorPercent: '' })));
  const shipping = price === null ? null : unlessRefused(() => minorToAmount(readShipping(draft.shipping)));
  const input: RefinedSheetInput = {
    ...measures,
    quotes: [...quotes],
    price,
    shipping: shipping === null ? null : { amount: shipping },
    commission,
    moment: 'estimated',
    audience,
  };
  return unlessRefused(() => refinedSheet(input)) ? input : null;
}

function sheetPriceOf({ priceMinor, linkedPercent }: ParsedPricing): RefinedSheetInput['price'] {
  return priceMinor === null ? { percent: linkedPercent } : { amount: minorToAmount(priceMinor) };
}

function unlessRefused<T>(step: () => T): T | null {
  try {
    return step();
  } catch (error) {
    if (error instanceof MeasureError) return null;
    throw error;
  }
}
