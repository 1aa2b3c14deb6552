import { MeasureError } from '#shared/domain-error.ts';
import type { FinenessUnit } from '#shared/fineness.ts';
import type { MassUnit } from '#shared/mass.ts';
import type { AssayMethodKey } from '#shared/assay/methods.ts';
import { isMetal, type Metal, type OtherElement } from '#shared/metals.ts';
import { minorToAmount } from '#shared/money.ts';
import { ENGINE_VERSION, refinedSheet } from '#shared/settlement/refined-sheet.ts';
import type { ContentEntry, QuoteRef, RefinedSheetInput } from '#shared/settlement/sheet-types.ts';
import { ConflictError, invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import { DealSheet } from '#server/models/deal-sheet.ts';
import type { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';

function contentOf(assay: LotAssay): ContentEntry {
  const { uncertaintyValue, uncertaintyUnit } = assay;
  const isGiven = !assay.isUncertaintyAssumed && uncertaintyValue !== null && uncertaintyUnit !== null;
  return {
    metal: assay.element as Metal | OtherElement,
    fineness: { value: assay.finenessValue, unit: assay.finenessUnit as FinenessUnit },
    uncertainty: isGiven ? { value: uncertaintyValue, unit: uncertaintyUnit as FinenessUnit } : null,
    method: assay.method as AssayMethodKey,
    paidFor: assay.isPaidFor,
  };
}

async function contentsOf(lot: Lot, unit: Unit): Promise<ContentEntry[]> {
  const assays = await LotAssay.findAll({
    where: { lotId: lot.id, assayVersion: lot.assayVersion },
    order: [['position', 'ASC']],
    transaction: unit.tx,
  });
  return assays.map(contentOf);
}

/**
 * What the deal's sheets are computed from: the lot as it stands, the terms of the deal, and the quotes of the moment. It is
 * kept for the seller's eyes; the buyer's sheet comes from the same input without the commission.
 * Throws `no-fresh-quote` when a metal paid for has no accepted quote at all.
 */
export async function sheetInputFor(
  lot: Lot,
  deal: Pick<Deal, 'priceMinor' | 'shippingMinor' | 'commissionPercent' | 'commissionMinimumMinor' | 'paymentMethod'>,
  quotes: readonly QuoteRef[],
  unit: Unit,
): Promise<RefinedSheetInput> {
  invariant(lot.grossValue !== null && lot.grossUnit !== null, 'an open lot has its mass');
  const contents = await contentsOf(lot, unit);
  const paid = contents.filter((content) => content.paidFor && isMetal(content.metal)).map(({ metal }) => metal);
  const { readabilityValue, readabilityUnit } = lot;
  const input: RefinedSheetInput = {
    gross: { value: lot.grossValue, unit: lot.grossUnit as MassUnit },
    readability:
      readabilityValue === null || readabilityUnit === null
        ? null
        : { value: readabilityValue, unit: readabilityUnit as MassUnit },
    contents,
    quotes: quotes.filter(({ metal }) => paid.includes(metal)),
    price: { amount: minorToAmount(deal.priceMinor) },
    shipping: { amount: minorToAmount(deal.shippingMinor) },
    commission: {
      method: deal.paymentMethod,
      percent: deal.commissionPercent,
      minimum: minorToAmount(deal.commissionMinimumMinor),
    },
    moment: 'provisional',
    audience: 'seller',
  };
  assertQuoted(input);
  return input;
}

function assertQuoted(input: RefinedSheetInput): void {
  try {
    refinedSheet(input);
  } catch (error) {
    if (error instanceof MeasureError && error.issues.some(({ code }) => code === 'quote-missing')) {
      throw new ConflictError('no-fresh-quote', 'There is no accepted quote yet for a metal of this lot.');
    }
    throw error;
  }
}

/** Both sheets of a moment, with the input that they recompute from. Written once and never changed. */
export async function storeDealSheets(
  dealId: string,
  moment: 'provisional' | 'final',
  input: RefinedSheetInput,
  unit: Unit,
): Promise<DealSheet> {
  const seller: RefinedSheetInput = { ...input, moment, audience: 'seller' };
  return DealSheet.create(
    {
      id: newId(),
      dealId,
      moment,
      engineVersion: ENGINE_VERSION,
      input: seller,
      buyerSheet: refinedSheet({ ...seller, audience: 'buyer' }),
      sellerSheet: refinedSheet(seller),
    },
    { transaction: unit.tx },
  );
}

/** The final sheet of a deal that settles as stated: mass and assay of the provisional one, at the quote fixed then. */
export async function storeFinalSheets(dealId: string, unit: Unit): Promise<DealSheet> {
  const provisional = await DealSheet.findOne({
    where: { dealId, moment: 'provisional' },
    transaction: unit.tx,
  });
  invariant(provisional !== null, 'a deal has its provisional sheet');
  return storeDealSheets(dealId, 'final', provisional.input as RefinedSheetInput, unit);
}
