import { dec, fixed, plain } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { percentText } from '#shared/lot-pricing.ts';
import { isMetal } from '#shared/metals.ts';
import { GRAMS_PER_TROY_OUNCE } from '#shared/mass.ts';
import type { RegisterRow } from '#shared/schemas/lots.ts';
import { measureLot } from '#shared/settlement/lot-measures.ts';
import { computeMelt, type MeltComputation } from '#shared/settlement/melt.ts';
import { percentOfMelt, priceAtPercentOfMelt } from '#shared/settlement/percent-of-melt.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import { invariant } from '#server/app-error.ts';
import { lotEntryOf } from '#server/features/lots/lot-entry.ts';
import { priceWaitOf } from '#server/features/quotes/price-wait.ts';
import type { QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import { photoUrl } from '#server/features/photos/photo-answer.ts';
import { moneyAnswer } from '#server/money-answer.ts';
import type { Lot } from '#server/models/lot.ts';
import type { LotAssay } from '#server/models/lot-assay.ts';
import type { Actor } from '#server/routing/define-route.ts';

export type RegisterSource = { lot: Lot; assays: LotAssay[]; photoId: string | null };

/** The melt value at the newest quotes, or null where one is missing. */
function meltOf({ lot, assays }: RegisterSource, quotes: readonly QuoteRef[]): MeltComputation | null {
  const entry = lotEntryOf(lot, assays);
  if (entry === null) return null;
  try {
    return computeMelt(measureLot(entry), quotes);
  } catch (error) {
    if (error instanceof MeasureError && error.issues.every(({ code }) => code === 'quote-missing'))
      return null;
    throw error;
  }
}

/** The band as percentages of the melt value itself: `99.93` to `100.07`. */
function bandOf({ figure }: MeltComputation): RegisterRow['melt'] {
  const value = dec(figure.value);
  if (!value.gt(0)) return null;
  const percent = (end: string) => fixed(dec(end).times(100).div(value), 2);
  return { value: figure.value, lowPercent: percent(figure.low), highPercent: percent(figure.high) };
}

type PriceFigures = Pick<RegisterRow, 'price' | 'linkedPercent' | 'percentOfMelt' | 'priceWait'>;

/** A linked lot stands at its percentage whatever the quote; only its sum follows, and waits with the market. */
function priceOf(
  { lot, assays }: RegisterSource,
  melt: MeltComputation | null,
  board: QuoteBoard,
): PriceFigures {
  const { priceMinor, linkedPercent } = lot;
  if (linkedPercent !== null) {
    const percent = percentText(linkedPercent);
    const paid = assays.flatMap(({ element, isPaidFor }) => (isPaidFor && isMetal(element) ? [element] : []));
    return {
      price: melt === null ? null : moneyAnswer(priceAtPercentOfMelt(melt.valueMinor, percent)),
      linkedPercent: percent,
      percentOfMelt: percent,
      priceWait: priceWaitOf(board, paid),
    };
  }
  invariant(priceMinor !== null, 'an open lot that is not linked has a price');
  return {
    price: moneyAnswer(priceMinor),
    linkedPercent: null,
    percentOfMelt: melt === null ? null : percentOfMelt(priceMinor, melt.valueMinor),
    priceWait: null,
  };
}

export function presentRegisterRow(
  source: RegisterSource,
  { quotes, board, viewer }: { quotes: readonly QuoteRef[]; board: QuoteBoard; viewer: Actor | null },
): RegisterRow {
  const { lot, assays, photoId } = source;
  const { mainMetal, mainFineGrams, grossValue, grossUnit, grossGrams, form } = lot;
  const main = assays.find((assay) => assay.element === mainMetal);
  invariant(
    mainMetal !== null && mainFineGrams !== null && main !== undefined && form !== null,
    'an open lot is ranked',
  );
  invariant(grossValue !== null && grossUnit !== null && grossGrams !== null, 'an open lot has its mass');
  const melt = meltOf(source, quotes);
  return {
    code: lot.code,
    title: lot.title ?? '',
    form,
    region: lot.region,
    evidenceGrade: lot.evidenceGrade,
    gross: { value: grossValue, unit: grossUnit, grams: plain(dec(grossGrams)) },
    mainMetal,
    finenessPermille: plain(dec(main.finenessPermille)),
    uncertaintyPermille: plain(dec(main.uncertaintyPermille)),
    fineGrams: fixed(dec(mainFineGrams), 6),
    fineTroyOunces: fixed(dec(mainFineGrams).div(GRAMS_PER_TROY_OUNCE), 6),
    ...priceOf(source, melt, board),
    settlesOn: lot.settlesOn,
    melt: melt === null ? null : bandOf(melt),
    closesAt: lot.closesAt?.toISOString() ?? null,
    thumb: photoId === null ? null : photoUrl(photoId, 240),
    isMine: viewer?.id === lot.sellerId,
  };
}
