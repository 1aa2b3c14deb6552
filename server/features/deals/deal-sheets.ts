import { MeasureError } from '#shared/domain-error.ts';
import { minorToAmount } from '#shared/money.ts';
import { ENGINE_VERSION, refinedSheet } from '#shared/settlement/refined-sheet.ts';
import { oldQuoteNotes } from '#shared/settlement/old-quote-notes.ts';
import type { QuoteRef, RefinedSheetInput, SettlementSheet } from '#shared/settlement/sheet-types.ts';
import { ConflictError, invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { lotEntryOf, lotSheetInput } from '#server/features/lots/lot-entry.ts';
import type { QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import type { Deal } from '#server/models/deal.ts';
import { DealSheet } from '#server/models/deal-sheet.ts';
import type { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import type { DealSide } from './deal-policy.ts';

type Terms = Pick<Deal, 'commissionPercent' | 'commissionMinimumMinor' | 'paymentMethod'>;

/** The quotes of the agreement; the board tells how old they are, and is null where a price fix has named fresh ones. */
type QuotesAgreed = { quotes: readonly QuoteRef[]; board: QuoteBoard | null };

/**
 * What the deal's sheets are computed from: the lot as it stands, the terms of the deal, and the quotes of the moment. It is
 * kept for the seller's eyes; the buyer's sheet comes from the same input without the commission.
 * Throws `no-fresh-quote` when a metal paid for has no accepted quote at all.
 */
export async function sheetInputFor(
  lot: Lot,
  terms: Terms,
  { quotes, board }: QuotesAgreed,
  unit: Unit,
): Promise<RefinedSheetInput> {
  const assays = await LotAssay.findAll({
    where: { lotId: lot.id, assayVersion: lot.assayVersion },
    transaction: unit.tx,
  });
  const entry = lotEntryOf(lot, assays);
  invariant(entry !== null, 'an open lot has its mass and its assay');
  const paid = entry.contents.filter(({ paidFor }) => paidFor).map(({ metal }) => metal);
  const commission = {
    method: terms.paymentMethod,
    percent: terms.commissionPercent,
    minimum: minorToAmount(terms.commissionMinimumMinor),
  };
  const used = quotes.filter(({ metal }) => paid.includes(metal));
  const isMarketClosed = board?.state === 'closed';
  const isFresh = ({ metal }: QuoteRef) =>
    board === null || (!isMarketClosed && board.byMetal[metal]?.isFresh === true);
  const input: RefinedSheetInput = {
    ...lotSheetInput(lot, entry, used, commission),
    shipping: { amount: minorToAmount(lot.shippingMinor ?? 0n) },
    moment: 'provisional',
    notes: oldQuoteNotes(used, { isFresh, isMarketClosed, now: unit.now }),
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

/** The same sheet for a reader who is neither side: nothing in it speaks to “you”. */
function toldByTheHouse(sheet: SettlementSheet): SettlementSheet {
  return {
    ...sheet,
    lines: sheet.lines.map((line) =>
      line.kind === 'total' ? { ...line, label: 'Goes to the seller' } : line,
    ),
  };
}

/** The seller's sheet carries the commission, which is not the buyer's business; the desk reads it without its “you”. */
export function sheetFor(side: DealSide, stored: DealSheet): SettlementSheet {
  const sheet = (side === 'buyer' ? stored.buyerSheet : stored.sellerSheet) as SettlementSheet;
  return side === 'desk' ? toldByTheHouse(sheet) : sheet;
}
