import { fixed, parseDecimal } from '../decimal.ts';
import { IssueCollector, MeasureError, invariant } from '../domain-error.ts';
import { MASS_UNIT_LABELS } from '../mass.ts';
import { METAL_NAMES } from '../metals.ts';
import { fromAmount, minorToAmount } from '../money.ts';
import { explainCommission } from './commission.ts';
import { measureLot, type LotMeasures } from './lot-measures.ts';
import { computeMelt, type MeltComputation } from './melt.ts';
import { percentOfMelt, priceAtPercentOfMelt } from './percent-of-melt.ts';
import type { RefinedSheetInput, SettlementSheet, SheetLine } from './sheet-types.ts';
import { massWorking, meltWorking, metalWorking } from './working.ts';

/**
 * Versions of the rules below, oldest first. A stored sheet names the version it was made with and recomputes under it.
 * 1: a price is a sum. 2: a price may be a share of the melt value; all else is as in 1.
 */
export const ENGINE_VERSIONS = ['1', '2'] as const;

/** A version of the rules that is kept here. */
export type EngineVersion = (typeof ENGINE_VERSIONS)[number];

/** The version that new sheets are made with. */
export const ENGINE_VERSION: EngineVersion = '2';

type Terms = {
  readonly priceMinor: bigint | null;
  readonly shippingMinor: bigint | null;
  readonly commission: ReturnType<typeof explainCommission> | null;
};

/**
 * The settlement sheet of a refined lot, sold outright or linked to its melt value. Pure: the same input gives the same sheet, and every amount can
 * be re-added by hand. All numbers are plain decimal strings; amounts in US dollars.
 *
 * The buyer's sheet ends with what goes into escrow (price + insured parcel); the seller's with what goes to him (price
 * − commission + insured parcel). Without a price both end at the melt value and `total` is null.
 * A linked price is its percentage of the melt value, rounded once to the cent.
 * Throws one MeasureError with every issue: the codes of `measureLot`, `computeMelt`, `fromAmount`, `commissionFor`, and
 * `amount-negative`, `shipping-without-price`, `commission-missing` (a seller's sheet with a price names its commission),
 * `engine-version-unknown` for a linked price under version 1.
 */
export function refinedSheet(
  input: RefinedSheetInput,
  engineVersion: EngineVersion = ENGINE_VERSION,
): SettlementSheet {
  assertPriceKnown(input, engineVersion);
  const issues = new IssueCollector();
  const measures = issues.attempt(() => measureLot(input));
  const melt = measures && issues.attempt(() => computeMelt(measures, input.quotes, input.weightStep));
  const terms = issues.attempt(() => readTerms(input, melt?.valueMinor ?? null));
  issues.finish();
  invariant(measures && melt && terms, 'every refusal is reported');
  const percent = shownPercent(input, terms.priceMinor, melt.valueMinor);
  const total = totalLine(input, terms);
  return {
    engineVersion,
    moment: input.moment,
    currency: 'USD',
    audience: input.audience,
    quotes: melt.metals.map(({ quote }) => ({ ...quote })),
    lines: [
      ...meltLines(measures, melt),
      ...priceLines(input, terms, { percent, meltValue: melt.figure.value }),
      ...(total ? [total] : []),
    ],
    fine: melt.metals.map(({ metal, grams, troyOuncesText }) => ({
      metal,
      grams: fixed(grams, 6),
      troyOunces: troyOuncesText,
    })),
    melt: melt.figure,
    price: terms.priceMinor === null ? null : minorToAmount(terms.priceMinor),
    percentOfMelt: percent,
    shipping: terms.shippingMinor === null ? null : minorToAmount(terms.shippingMinor),
    total: total?.amount ?? null,
    assumed: [...measures.assumed, ...(input.notes ?? [])],
  };
}

function assertPriceKnown({ price }: RefinedSheetInput, engineVersion: EngineVersion): void {
  if (engineVersion !== '1' || price === null || 'amount' in price) return;
  throw new MeasureError('engine-version-unknown', '/engineVersion', 'These rules know no linked price.');
}

/** A linked price stands at its own percentage, whatever the rounding to the cent makes of it. */
function shownPercent(input: RefinedSheetInput, priceMinor: bigint | null, meltMinor: bigint): string | null {
  if (priceMinor === null) return null;
  return linkedPercentOf(input) ?? percentOfMelt(priceMinor, meltMinor);
}

/** Without a melt value, which is refused elsewhere, a linked price stays unknown. */
function readPrice(price: RefinedSheetInput['price'], meltMinor: bigint | null): bigint | null {
  if (price === null || 'amount' in price) return readAmount(price, '/price/amount');
  const percent = parseDecimal(price.percent, { field: '/price/percent', maxDecimals: 4, above: '0' });
  return meltMinor === null ? null : priceAtPercentOfMelt(meltMinor, fixed(percent, 4));
}

function readTerms(input: RefinedSheetInput, meltMinor: bigint | null): Terms {
  const issues = new IssueCollector();
  const priceMinor = issues.attempt(() => readPrice(input.price, meltMinor));
  const shippingMinor = issues.attempt(() => readAmount(input.shipping, '/shipping/amount'));
  if (input.price === null && input.shipping !== null) {
    issues.add('shipping-without-price', '/shipping', 'A parcel is charged only together with a price.');
  }
  const commission = issues.attempt(() => readCommission(input, priceMinor ?? null));
  issues.finish();
  return {
    priceMinor: priceMinor ?? null,
    shippingMinor: shippingMinor ?? null,
    commission: commission ?? null,
  };
}

function readAmount(entry: { amount: string } | null, field: string): bigint | null {
  if (entry === null) return null;
  const { minor } = fromAmount(entry.amount, field);
  if (minor < 0n) throw new MeasureError('amount-negative', field, 'This sum is never below zero.');
  return minor;
}

function readCommission(input: RefinedSheetInput, priceMinor: bigint | null): Terms['commission'] {
  if (input.audience === 'buyer' || priceMinor === null) return null;
  if (input.commission === null) {
    throw new MeasureError('commission-missing', '/commission', 'A seller’s sheet names its commission.');
  }
  const { percent, minimum } = input.commission;
  const minimumMinor = fromAmount(minimum, '/commission/minimum').minor;
  return explainCommission(priceMinor, { percent, minimumMinor });
}

function meltLines(measures: LotMeasures, melt: MeltComputation): SheetLine[] {
  const { gross } = measures;
  return [
    {
      key: 'gross',
      kind: 'mass',
      label: 'Gross mass',
      quantity: { value: gross.value, unit: MASS_UNIT_LABELS[gross.unit] },
      rate: null,
      amount: null,
      working: massWorking(measures),
    },
    ...melt.metals.map((figure): SheetLine => ({
      key: `fine:${figure.metal}`,
      kind: 'metal',
      label: `${METAL_NAMES[figure.metal]}, fine`,
      quantity: { value: figure.troyOuncesText, unit: MASS_UNIT_LABELS.ozt },
      rate: { value: figure.quote.usdPerTroyOunce, unit: 'US$/oz t' },
      amount: minorToAmount(figure.amountMinor),
      working: metalWorking(measures, figure),
    })),
    {
      key: 'melt',
      kind: 'sum',
      label: 'Melt value',
      quantity: null,
      rate: null,
      amount: melt.figure.value,
      working: meltWorking(melt),
    },
  ];
}

function priceLines(
  input: RefinedSheetInput,
  terms: Terms,
  { percent, meltValue }: { percent: string | null; meltValue: string },
): SheetLine[] {
  const { priceMinor, shippingMinor, commission } = terms;
  if (priceMinor === null) return [];
  const price = minorToAmount(priceMinor);
  const lines: SheetLine[] = [
    {
      key: 'price',
      kind: 'price',
      label: priceLabel(input),
      quantity: null,
      rate: percent === null ? null : { value: percent, unit: '%' },
      amount: price,
      working: [priceWorking(input, meltValue, price, percent)],
    },
  ];
  if (commission !== null && input.commission !== null) {
    lines.push(commissionLine(input.commission, commission, price));
  }
  if (shippingMinor !== null) {
    const shipping = minorToAmount(shippingMinor);
    lines.push({
      key: 'shipping',
      kind: 'charge',
      label: 'Insured parcel',
      quantity: null,
      rate: null,
      amount: shipping,
      working:
        input.audience === 'buyer'
          ? [`Charge for the insured parcel: US$ ${shipping}`]
          : [`Paid by the buyer, passed on in full: US$ ${shipping}`],
    });
  }
  return lines;
}

/** The percentage of a linked price with at least two digits after the dot, as it was agreed. */
function linkedPercentOf({ price }: RefinedSheetInput): string | null {
  if (price === null || 'amount' in price) return null;
  const percent = parseDecimal(price.percent);
  return fixed(percent, Math.max(2, percent.decimalPlaces()));
}

function priceLabel(input: RefinedSheetInput): string {
  const linked = linkedPercentOf(input);
  if (linked !== null) return `Price, ${linked} % of melt`;
  return input.moment === 'estimated' ? 'Price asked' : 'Price agreed';
}

function priceWorking(
  input: RefinedSheetInput,
  meltValue: string,
  price: string,
  percent: string | null,
): string {
  const linked = linkedPercentOf(input);
  if (linked !== null) return `${linked} % of US$ ${meltValue}, rounded once: US$ ${price}`;
  const share = percent === null ? '' : `, ${percent} % of the melt value`;
  return `Price of the metal, a sum: US$ ${price}${share}`;
}

function commissionLine(
  { method, percent, minimum }: NonNullable<RefinedSheetInput['commission']>,
  { minor, byPercentMinor, rule }: NonNullable<Terms['commission']>,
  price: string,
): SheetLine {
  const because = {
    percent: [],
    minimum: [`Lifted to the minimum of US$ ${minorToAmount(minor)}`],
    price: [`Minimum US$ ${minimum}; held to the price, US$ ${price}`],
  } as const;
  return {
    key: 'commission',
    kind: 'charge',
    label: 'Commission',
    quantity: null,
    rate: { value: percent, unit: '%' },
    amount: minorToAmount(-minor),
    working: [
      `${percent} % of US$ ${price} (paid by ${method.replaceAll('_', ' ')}), rounded to US$ ${minorToAmount(byPercentMinor)}`,
      ...because[rule],
    ],
  };
}

function totalLine(input: RefinedSheetInput, terms: Terms): SheetLine | null {
  const { priceMinor, shippingMinor, commission } = terms;
  if (priceMinor === null) return null;
  const isBuyer = input.audience === 'buyer';
  const totalMinor = priceMinor - (commission?.minor ?? 0n) + (shippingMinor ?? 0n);
  const parts = [minorToAmount(priceMinor)];
  if (commission) parts.push(`− ${minorToAmount(commission.minor)}`);
  if (shippingMinor !== null) parts.push(`+ ${minorToAmount(shippingMinor)}`);
  return {
    key: isBuyer ? 'total' : 'net',
    kind: 'total',
    label: isBuyer ? 'You pay into escrow' : 'Goes to you',
    quantity: null,
    rate: null,
    amount: minorToAmount(totalMinor),
    working: [`${parts.join(' ')} = US$ ${minorToAmount(totalMinor)}`],
  };
}
