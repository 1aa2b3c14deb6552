import { dec, plain } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { draftSheetInput } from '#shared/lot-submission.ts';
import { percentText } from '#shared/lot-pricing.ts';
import { isMetal } from '#shared/metals.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import { isDeskStaff } from '#shared/roles.ts';
import { lotDraft, type ContentAnswer, type LotAnswer, type PriceWait } from '#shared/schemas/lots.ts';
import { explainCommission } from '#shared/settlement/commission.ts';
import { refinedSheet } from '#shared/settlement/refined-sheet.ts';
import type {
  CommissionTerms,
  QuoteRef,
  RefinedSheetInput,
  SettlementSheet,
} from '#shared/settlement/sheet-types.ts';
import { photoAnswerOf } from '#server/features/photos/photo-answer.ts';
import { priceWaitOf } from '#server/features/quotes/price-wait.ts';
import { quoteRefs, type QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import { moneyAnswer } from '#server/money-answer.ts';
import type { LotAssay } from '#server/models/lot-assay.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { presentCertificate } from './certificate-presenter.ts';
import type { CurrentFee } from '#server/features/fees/fee-queries.ts';
import { lotEntryOf, lotSheetInput } from './lot-entry.ts';
import { presentHistory } from './lot-history.ts';
import { isSeller, lotRights } from './lot-policy.ts';
import type { LotDetail } from './lot-queries.ts';

/** The payment method that a seller's sheet is shown for; the others stand beside it as nets. */
const SHOWN_METHOD: CurrentFee['method'] = 'card';

export function presentContent(assay: LotAssay): ContentAnswer {
  return {
    element: assay.element,
    fineness: { value: assay.finenessValue, unit: assay.finenessUnit },
    finenessPermille: plain(dec(assay.finenessPermille)),
    uncertaintyPermille: plain(dec(assay.uncertaintyPermille)),
    isUncertaintyAssumed: assay.isUncertaintyAssumed,
    method: assay.method,
    isPaidFor: assay.isPaidFor,
  };
}

/** A sheet, or null where a metal has no quote yet; a stored lot is refused for nothing else. */
function sheetOrNull(input: RefinedSheetInput | null): SettlementSheet | null {
  if (input === null) return null;
  try {
    return refinedSheet(input);
  } catch (error) {
    if (error instanceof MeasureError && error.issues.every(({ code }) => code === 'quote-missing'))
      return null;
    throw error;
  }
}

function termsOf(fee: CurrentFee): CommissionTerms {
  return { method: fee.method, percent: fee.percent, minimum: minorToAmount(fee.minimumMinor) };
}

type Sheets = Pick<LotAnswer, 'sheet' | 'sellerSheet'>;

function sheetsOf(
  detail: LotDetail,
  quotes: readonly QuoteRef[],
  fees: readonly CurrentFee[],
  isOwn: boolean,
): Sheets {
  const fee = fees.find(({ method }) => method === SHOWN_METHOD);
  const commission = isOwn && fee !== undefined ? termsOf(fee) : null;
  if (detail.lot.state === 'draft') {
    const draft = lotDraft.parse(detail.lot.draft);
    const seller =
      commission === null ? null : draftSheetInput(draft, quotes, { audience: 'seller', commission });
    return {
      sheet: sheetOrNull(draftSheetInput(draft, quotes)),
      sellerSheet: seller?.price === null ? null : sheetOrNull(seller),
    };
  }
  const entry = lotEntryOf(detail.lot, detail.assays);
  if (entry === null) return { sheet: null, sellerSheet: null };
  return {
    sheet: sheetOrNull(lotSheetInput(detail.lot, entry, quotes)),
    sellerSheet:
      commission === null ? null : sheetOrNull(lotSheetInput(detail.lot, entry, quotes, commission)),
  };
}

/** What goes to the seller by each payment method, parcel included. */
function netsOf(
  priceMinor: bigint | null,
  shippingMinor: bigint,
  fees: readonly CurrentFee[],
): LotAnswer['nets'] {
  if (priceMinor === null) return [];
  return fees.map((fee) => {
    const { minor } = explainCommission(priceMinor, fee);
    return {
      method: fee.method,
      percent: fee.percent,
      minimum: moneyAnswer(fee.minimumMinor),
      commission: moneyAnswer(minor),
      net: moneyAnswer(priceMinor - minor + shippingMinor),
    };
  });
}

type Figures = Pick<
  LotAnswer,
  | 'form'
  | 'title'
  | 'description'
  | 'gross'
  | 'readability'
  | 'contents'
  | 'pricingBasis'
  | 'linkedPercent'
  | 'shipping'
  | 'destinations'
>;

/** The sum, or what the share of melt of a linked lot comes to on its sheet. */
function priceMinorOf({ lot }: LotDetail, sheet: SettlementSheet | null): bigint | null {
  if (lot.linkedPercent === null) return lot.priceMinor;
  return sheet === null || sheet.price === null ? null : fromAmount(sheet.price).minor;
}

/** Why a linked lot's price cannot be fixed now. */
function priceWaitFor({ lot, assays }: LotDetail, board: QuoteBoard): PriceWait | null {
  if (lot.state === 'draft' || lot.linkedPercent === null) return null;
  const paid = assays.flatMap(({ element, isPaidFor }) => (isPaidFor && isMetal(element) ? [element] : []));
  return priceWaitOf(board, paid);
}

/** While a draft is being typed, what was submitted before is nobody's business; the editor reads the draft itself. */
function figuresOf({ lot, assays }: LotDetail): Figures {
  if (lot.state === 'draft') {
    const draft = lotDraft.parse(lot.draft);
    return {
      form: draft.form === '' ? null : draft.form,
      title: draft.title,
      description: draft.description,
      gross: null,
      readability: null,
      contents: [],
      pricingBasis: draft.pricing === 'linked' ? 'linked' : 'outright',
      linkedPercent: null,
      shipping: null,
      destinations: draft.destinations,
    };
  }
  const { grossValue, grossUnit, grossGrams, readabilityValue, readabilityUnit } = lot;
  return {
    form: lot.form,
    title: lot.title ?? '',
    description: lot.description ?? '',
    gross:
      grossValue === null || grossUnit === null || grossGrams === null
        ? null
        : { value: grossValue, unit: grossUnit, grams: plain(dec(grossGrams)) },
    readability:
      readabilityValue === null || readabilityUnit === null
        ? null
        : { value: readabilityValue, unit: readabilityUnit },
    contents: assays.map(presentContent),
    pricingBasis: lot.pricingBasis,
    linkedPercent: lot.linkedPercent === null ? null : percentText(lot.linkedPercent),
    shipping: lot.shippingMinor === null ? null : moneyAnswer(lot.shippingMinor),
    destinations: lot.destinations as string[],
  };
}

type Viewing = { viewer: Actor | null; board: QuoteBoard; fees: readonly CurrentFee[]; now: Date };

/** Everyone may know until when a lot is held; the sum is between its holder and the house. */
function presentFix({ fix }: LotDetail, { viewer, now }: Viewing): LotAnswer['priceFix'] {
  if (fix === null || now >= fix.fixedUntil) return null;
  const isMine = viewer !== null && viewer.id === fix.memberId;
  return {
    isMine,
    until: fix.fixedUntil.toISOString(),
    price: isMine ? moneyAnswer(fix.priceMinor) : null,
  };
}

/** A lot as a viewer may see it: never an address; the draft, nets and reasons only for the seller (and the desk). */
export function presentLot(detail: LotDetail, viewing: Viewing): LotAnswer {
  const { viewer, board, fees } = viewing;
  const { lot, deal } = detail;
  const wait = priceWaitFor(detail, board);
  const priceFix = presentFix(detail, viewing);
  const isOwn = isSeller(viewer, lot);
  const isInside = isOwn || (viewer !== null && isDeskStaff(viewer.role));
  const isDraft = lot.state === 'draft';
  // Who holds a fix is shown what he can agree to: its quotes, not newer ones.
  const quotes = priceFix?.isMine === true ? (detail.fix?.quotes as QuoteRef[]) : quoteRefs(board);
  const sheets = sheetsOf(detail, quotes, fees, isOwn);
  const priceMinor = isDraft ? null : priceMinorOf(detail, sheets.sheet);
  return {
    code: lot.code,
    state: lot.state,
    version: lot.draftVersion,
    ...figuresOf(detail),
    region: lot.region,
    isMine: isOwn,
    seller: { region: lot.region, completedDeals: detail.completedDeals },
    evidenceGrade: lot.evidenceGrade,
    certificate:
      detail.certificate === null || isDraft
        ? null
        : presentCertificate(detail.certificate, lot, deal, viewer),
    closesAt: lot.closesAt?.toISOString() ?? null,
    openedAt: lot.openedAt?.toISOString() ?? null,
    photos: detail.photos.map(photoAnswerOf),
    price: priceMinor === null ? null : moneyAnswer(priceMinor),
    floorPercent: isInside && lot.floorPercent !== null ? percentText(lot.floorPercent) : null,
    priceWait: wait,
    priceFix,
    ...sheets,
    nets: isOwn && !isDraft ? netsOf(priceMinor, lot.shippingMinor ?? 0n, fees) : [],
    quoteState: board.state,
    stateReason: isInside ? lot.stateReason : null,
    history: presentHistory(detail.events, isInside),
    dealCode: deal === null || deal.liveLotId === null ? null : deal.code,
    draft: isOwn && (isDraft || lot.state === 'returned') ? lotDraft.parse(lot.draft) : null,
    can: lotRights(viewer, lot, {
      isSellerSuspended: detail.isSellerSuspended,
      isPriceWaiting: wait !== null,
      holdsFix: priceFix?.isMine ?? false,
    }),
  };
}
