import { ASSAY_METHODS, defaultExpandedPermille, isAssayMethodKey } from '../assay/methods.ts';
import type { AssayMethodKey } from '../assay/methods.ts';
import { lastDigitOf, plain, type Dec } from '../decimal.ts';
import { IssueCollector, MeasureError, invariant } from '../domain-error.ts';
import { assertTotalWithinWhole, fractionValue, toFraction } from '../fineness.ts';
import type { FinenessEntry, MassFraction } from '../fineness.ts';
import { GRAMS_PER_TROY_OUNCE, GRAMS_PER_UNIT, massText, toGrams } from '../mass.ts';
import type { MassEntry } from '../mass.ts';
import { elementName, isMetal, isOtherElement } from '../metals.ts';
import type { Metal, OtherElement } from '../metals.ts';
import { COVERAGE_FACTOR, massUncertainty } from '../uncertainty.ts';
import type { BalanceClass } from '../uncertainty.ts';
import type { AssumedValue, ContentEntry } from './sheet-types.ts';

/** What the fine content of a lot follows from, as entered. */
export type LotEntry = {
  readonly gross: MassEntry;
  readonly readability: MassEntry | null;
  readonly balanceClass?: BalanceClass | null | undefined;
  readonly contents: readonly ContentEntry[];
};

/** One metal of a lot with its exact fraction and standard uncertainty (as a fraction of one). */
export type MeasuredContent = {
  readonly metal: Metal | OtherElement;
  readonly paidFor: boolean;
  readonly fineness: FinenessEntry;
  readonly fraction: MassFraction;
  readonly standardUncertainty: Dec;
};

/** A lot's measures in grams and fractions, and what had to be assumed for the metals paid for. */
export type LotMeasures = {
  readonly gross: MassEntry;
  readonly grossGrams: Dec;
  readonly readability: MassEntry;
  readonly massUncertaintyGrams: Dec;
  readonly contents: readonly MeasuredContent[];
  readonly assumed: AssumedValue[];
};

/**
 * Reads and checks mass and assay. `massField` is the JSON pointer of the gross mass. Every refusal is told at once.
 * Throws MeasureError with the codes of `toGrams` and `toFraction`, and `readability-too-large`, `metal-unknown`,
 * `metal-repeated`, `method-unknown`, `not-payable`, `contents-missing`, `fractions-over-whole`.
 */
export function measureLot(entry: LotEntry, massField = '/gross'): LotMeasures {
  const issues = new IssueCollector();
  const assumed: AssumedValue[] = [];
  const grossGrams = issues.attempt(() => toGrams(entry.gross, massField));
  const readability = issues.attempt(() => readReadability(entry, grossGrams, assumed));
  if (entry.contents.length === 0) {
    issues.add('contents-missing', '/contents', 'Give at least one metal with its fineness.');
  }
  const contents = entry.contents.flatMap((content, index) => {
    const measured = issues.attempt(() => measureContent(content, index, entry.contents, assumed));
    return measured ? [measured] : [];
  });
  issues.attempt(() =>
    assertTotalWithinWhole(
      contents.map((content) => content.fraction),
      '/contents',
    ),
  );
  issues.finish();
  invariant(grossGrams && readability, 'a refused mass is always reported');
  return {
    gross: entry.gross,
    grossGrams,
    readability: readability.entry,
    massUncertaintyGrams: massUncertainty(grossGrams, readability.grams, entry.balanceClass ?? null),
    contents,
    assumed,
  };
}

function readReadability(
  entry: LotEntry,
  grossGrams: Dec | undefined,
  assumed: AssumedValue[],
): { entry: MassEntry; grams: Dec } | undefined {
  if (entry.readability !== null) {
    const grams = toGrams(entry.readability, '/readability');
    if (grossGrams && grams.gt(grossGrams)) {
      throw new MeasureError(
        'readability-too-large',
        '/readability/value',
        'The readability is larger than the mass itself.',
      );
    }
    return { entry: entry.readability, grams };
  }
  if (!grossGrams) return undefined;
  const step = lastDigitOf(entry.gross.value);
  const typed: MassEntry = { value: plain(step), unit: entry.gross.unit };
  assumed.push({
    field: '/readability',
    value: massText(typed),
    reason: 'Not given: one unit of the last digit typed.',
  });
  return { entry: typed, grams: step.times(GRAMS_PER_UNIT[entry.gross.unit]) };
}

function measureContent(
  content: ContentEntry,
  index: number,
  all: readonly ContentEntry[],
  assumed: AssumedValue[],
): MeasuredContent {
  const field = `/contents/${index}`;
  const issues = new IssueCollector();
  issues.attempt(() => checkMetal(content, index, all));
  if (!isAssayMethodKey(content.method)) {
    issues.add('method-unknown', `${field}/method`, 'Choose one of the methods listed.');
  }
  const fraction = issues.attempt(() => toFraction(content.fineness, `${field}/fineness`));
  const expanded = issues.attempt(() => readExpanded(content, field));
  issues.finish();
  invariant(fraction && expanded, 'a refused fineness is always reported');
  if (expanded.assumed && content.paidFor) assumed.push(expanded.assumed);
  return {
    metal: content.metal,
    paidFor: content.paidFor,
    fineness: content.fineness,
    fraction,
    standardUncertainty: expanded.value.div(COVERAGE_FACTOR),
  };
}

function checkMetal(content: ContentEntry, index: number, all: readonly ContentEntry[]): void {
  const field = `/contents/${index}`;
  const symbol: string = content.metal;
  if (!isMetal(symbol) && !isOtherElement(symbol)) {
    throw new MeasureError('metal-unknown', `${field}/metal`, 'Give the chemical symbol of a metal listed.');
  }
  if (all.findIndex((other) => other.metal === symbol) !== index) {
    throw new MeasureError('metal-repeated', `${field}/metal`, `${elementName(symbol)} is given twice.`);
  }
  if (content.paidFor && !isMetal(symbol)) {
    throw new MeasureError(
      'not-payable',
      `${field}/paidFor`,
      `${elementName(symbol)} has no quote and is not paid for.`,
    );
  }
}

function readExpanded(content: ContentEntry, field: string): { value: Dec; assumed: AssumedValue | null } {
  if (content.uncertainty !== null) {
    const given = toFraction(content.uncertainty, `${field}/uncertainty`);
    return { value: fractionValue(given), assumed: null };
  }
  const method: AssayMethodKey = isAssayMethodKey(content.method) ? content.method : 'none';
  const permille = defaultExpandedPermille(method);
  return {
    value: permille.div(1000),
    assumed: {
      field: `${field}/uncertainty`,
      value: `${plain(permille)} ‰`,
      reason: `Not given: default of the method “${ASSAY_METHODS[method].name}”, expanded (k = 2), from memory.`,
    },
  };
}

/** Exact fine mass in grams: gross × fraction, divided last. */
export function fineGrams(grossGrams: Dec, fraction: MassFraction): Dec {
  return grossGrams.times(fraction.numerator).div(fraction.denominator);
}

/** Exact fine mass in troy ounces: divided once, so that nothing is lost to karat thirds. */
export function fineTroyOunces(grossGrams: Dec, fraction: MassFraction): Dec {
  return grossGrams.times(fraction.numerator).div(fraction.denominator.times(GRAMS_PER_TROY_OUNCE));
}
