import { fixed } from '../decimal.ts';
import { IssueCollector, MeasureError, invariant } from '../domain-error.ts';
import { MASS_UNIT_LABELS } from '../mass.ts';
import { METAL_NAMES } from '../metals.ts';
import { fromAmount, minorToAmount } from '../money.ts';
import { explainCommission } from './commission.ts';
import { measureLot, type LotMeasures } from './lot-measures.ts';
import { computeMelt, type MeltComputation } from './melt.ts';
import { percentOfMelt } from './percent-of-melt.ts';
import type { RefinedSheetInput, SettlementSheet, SheetLine } from './sheet-types.ts';
import { massWorking, meltWorking, metalWorking } from './working.ts';

/** Version of the rules below. A stored sheet names the version it was made with and recomputes under it. */
export const ENGINE_VERSION = '1';

type Terms = {
  readonly priceMinor: bigint | null;
  readonly shippingMinor: bigint | null;
  readonly commission: ReturnType<typeof explainCommission> | null;
};

/**
 * The settlement sheet of a refined lot sold outright. Pure: the same input gives the same sheet, and every amount can
 * be re-added by hand. All numbers are plain decimal strings; amounts in US dollars.
 *
 * The buyer's sheet ends with what goes into escrow (price + insured parcel); the seller's with what goes to him (price
 * − commission + insured parcel). Without a price both end at the melt value and `total` is null.
 * Throws one MeasureError with every issue: the codes of `measureLot`, `computeMelt`, `fromAmount`, `commissionFor`, and
 * `amount-negative`, `shipping-without-price`, `commission-missing` (a seller's sheet with a price names its commission).
 */
export function refinedSheet(input: RefinedSheetInput): SettlementSheet {
  const issues = new IssueCollector();
  const measures = issues.attempt(() => measureLot(input));
  const melt = measures && issues.attempt(() => computeMelt(measures, input.quotes, input.weightStep));
  const terms = issues.attempt(() => readTerms(input));
  issues.finish();
  invariant(measures && melt && terms, 'every refusal is reported');
  const percent = terms.priceMinor === null ? null : percentOfMelt(terms.priceMinor, melt.valueMinor);
  const total = totalLine(input, terms);
  return {
    engineVersion: ENGINE_VERSION,
    moment: input.moment,
    currency: 'USD',
    audience: input.audience,
    quotes: melt.metals.map(({ quote }) => ({ ...quote })),
    lines: [...meltLines(measures, melt), ...priceLines(input, terms, percent), ...(total ? [total] : [])],
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

function readTerms(input: RefinedSheetInput): Terms {
  const issues = new IssueCollector();
  const priceMinor = issues.attempt(() => readAmount(input.price, '/price/amount'));
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

function priceLines(input: RefinedSheetInput, terms: Terms, percent: string | null): SheetLine[] {
  const { priceMinor, shippingMinor, commission } = terms;
  if (priceMinor === null) return [];
  const price = minorToAmount(priceMinor);
  const lines: SheetLine[] = [
    {
      key: 'price',
      kind: 'price',
      label: input.moment === 'estimated' ? 'Price asked' : 'Price agreed',
      quantity: null,
      rate: percent === null ? null : { value: percent, unit: '%' },
      amount: price,
      working: [
        `Price of the metal, a sum: US$ ${price}` +
          (percent === null ? '' : `, ${percent} % of the melt value`),
      ],
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
