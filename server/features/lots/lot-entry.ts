import { isAssayMethodKey } from '#shared/assay/methods.ts';
import { dec, plain } from '#shared/decimal.ts';
import { isFinenessUnit, type FinenessEntry } from '#shared/fineness.ts';
import { isMassUnit, type MassEntry } from '#shared/mass.ts';
import { isMetal, isOtherElement } from '#shared/metals.ts';
import { minorToAmount } from '#shared/money.ts';
import type { LotEntry } from '#shared/settlement/lot-measures.ts';
import type {
  CommissionTerms,
  ContentEntry,
  QuoteRef,
  RefinedSheetInput,
} from '#shared/settlement/sheet-types.ts';
import { invariant } from '#server/app-error.ts';
import type { Lot } from '#server/models/lot.ts';
import type { LotAssay } from '#server/models/lot-assay.ts';

export function massEntryOf(value: string | null, unit: string | null): MassEntry | null {
  if (value === null || unit === null) return null;
  invariant(isMassUnit(unit), 'a stored mass has a unit that is known');
  return { value, unit };
}

function finenessEntryOf(value: string, unit: string): FinenessEntry {
  invariant(isFinenessUnit(unit), 'a stored fineness has a unit that is known');
  return { value, unit };
}

export function contentEntryOf(assay: LotAssay): ContentEntry {
  const { element, method, uncertaintyValue, uncertaintyUnit } = assay;
  invariant(isMetal(element) || isOtherElement(element), 'a stored assay names a known element');
  invariant(isAssayMethodKey(method), 'a stored assay names a known method');
  const isGiven = !assay.isUncertaintyAssumed && uncertaintyValue !== null && uncertaintyUnit !== null;
  return {
    metal: element,
    fineness: finenessEntryOf(assay.finenessValue, assay.finenessUnit),
    uncertainty: isGiven ? finenessEntryOf(uncertaintyValue, uncertaintyUnit) : null,
    method,
    paidFor: assay.isPaidFor,
  };
}

/** Mass and assay of a submitted lot as they were typed; null while it has never been submitted. */
export function lotEntryOf(lot: Lot, assays: readonly LotAssay[]): LotEntry | null {
  const gross = massEntryOf(lot.grossValue, lot.grossUnit);
  if (gross === null || assays.length === 0) return null;
  const ordered = [...assays].sort((left, right) => left.position - right.position);
  return {
    gross,
    readability: massEntryOf(lot.readabilityValue, lot.readabilityUnit),
    contents: ordered.map(contentEntryOf),
  };
}

/** A lot's price as its sheet takes it: a sum, or the share of melt that a linked lot stands at. */
function sheetPriceOf({ priceMinor, linkedPercent }: Lot): RefinedSheetInput['price'] {
  if (linkedPercent !== null) return { percent: plain(dec(linkedPercent)) };
  return priceMinor === null ? null : { amount: minorToAmount(priceMinor) };
}

/** Input of a lot's estimated sheet; with a commission it is the seller's. */
export function lotSheetInput(
  lot: Lot,
  entry: LotEntry,
  quotes: readonly QuoteRef[],
  commission: CommissionTerms | null = null,
): RefinedSheetInput {
  const price = sheetPriceOf(lot);
  return {
    gross: entry.gross,
    readability: entry.readability,
    contents: [...entry.contents],
    quotes: [...quotes],
    price,
    shipping:
      price !== null && lot.shippingMinor !== null ? { amount: minorToAmount(lot.shippingMinor) } : null,
    commission,
    moment: 'estimated',
    audience: commission === null ? 'buyer' : 'seller',
  };
}
