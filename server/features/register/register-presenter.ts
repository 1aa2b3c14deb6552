import { dec, fixed, plain } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { GRAMS_PER_TROY_OUNCE } from '#shared/mass.ts';
import type { RegisterRow } from '#shared/schemas/lots.ts';
import { measureLot } from '#shared/settlement/lot-measures.ts';
import { computeMelt, type MeltComputation } from '#shared/settlement/melt.ts';
import { percentOfMelt } from '#shared/settlement/percent-of-melt.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import { invariant } from '#server/app-error.ts';
import { lotEntryOf } from '#server/features/lots/lot-entry.ts';
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

export function presentRegisterRow(
  source: RegisterSource,
  quotes: readonly QuoteRef[],
  viewer: Actor | null,
): RegisterRow {
  const { lot, assays, photoId } = source;
  const { mainMetal, mainFineGrams, grossValue, grossUnit, grossGrams, priceMinor, form } = lot;
  const main = assays.find((assay) => assay.element === mainMetal);
  invariant(
    mainMetal !== null && mainFineGrams !== null && main !== undefined && form !== null,
    'an open lot is ranked',
  );
  invariant(
    grossValue !== null && grossUnit !== null && grossGrams !== null && priceMinor !== null,
    'an open lot has mass and price',
  );
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
    price: moneyAnswer(priceMinor),
    settlesOn: lot.settlesOn,
    melt: melt === null ? null : bandOf(melt),
    percentOfMelt: melt === null ? null : percentOfMelt(priceMinor, melt.valueMinor),
    closesAt: lot.closesAt?.toISOString() ?? null,
    thumb: photoId === null ? null : photoUrl(photoId, 240),
    isMine: viewer?.id === lot.sellerId,
  };
}
