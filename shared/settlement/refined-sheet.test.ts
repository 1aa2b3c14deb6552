import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ratio, rational, times } from '../testing/rational.ts';
import { isExpandedRight, oracleLine, type OracleMetal } from '../testing/sheet-oracle.ts';
import { MeasureError } from '../domain-error.ts';
import { METALS, type Metal } from '../metals.ts';
import { fromAmount } from '../money.ts';
import { commissionFor } from './commission.ts';
import { ENGINE_VERSION, refinedSheet } from './refined-sheet.ts';
import type { RefinedSheetInput, SettlementSheet } from './sheet-types.ts';

const cents = (amount: string | null | undefined) => fromAmount(amount ?? 'none').minor;

const BUTTON: RefinedSheetInput = {
  gross: { value: '31.05', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
  contents: [
    {
      metal: 'Au',
      fineness: { value: '958.3', unit: 'permille' },
      uncertainty: { value: '0.5', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
    {
      metal: 'Ag',
      fineness: { value: '30', unit: 'permille' },
      uncertainty: { value: '2', unit: 'permille' },
      method: 'titration',
      paidFor: true,
    },
    {
      metal: 'Cu',
      fineness: { value: '1', unit: 'percent' },
      uncertainty: null,
      method: 'none',
      paidFor: false,
    },
  ],
  quotes: [
    {
      id: 'q-au',
      metal: 'Au',
      usdPerTroyOunce: '4182.40',
      at: '2026-12-01T14:02:00.000Z',
      source: 'day feed',
    },
    { id: 'q-ag', metal: 'Ag', usdPerTroyOunce: '52.35', at: '2026-12-01T14:02:00.000Z', source: 'day feed' },
    {
      id: 'q-pt',
      metal: 'Pt',
      usdPerTroyOunce: '1604.00',
      at: '2026-12-01T14:02:00.000Z',
      source: 'day feed',
    },
  ],
  price: { amount: '3950.00' },
  shipping: { amount: '45.00' },
  commission: { method: 'card', percent: '4', minimum: '2.00' },
  moment: 'provisional',
  audience: 'buyer',
};

const line = (sheet: SettlementSheet, key: string) => sheet.lines.find((entry) => entry.key === key);
const keys = (sheet: SettlementSheet) => sheet.lines.map((entry) => entry.key);

function refusals(change: object): string[] {
  try {
    refinedSheet({ ...BUTTON, ...change } as RefinedSheetInput);
  } catch (error) {
    if (error instanceof MeasureError) return error.issues.map(({ code, field }) => `${code} at ${field}`);
    throw error;
  }
  return [];
}

describe('the buyer’s sheet', () => {
  const sheet = refinedSheet(BUTTON);

  it('has its lines in order and ends with what goes into escrow', () => {
    expect(keys(sheet)).toEqual(['gross', 'fine:Au', 'fine:Ag', 'melt', 'price', 'shipping', 'total']);
    expect(line(sheet, 'total')).toMatchObject({
      kind: 'total',
      label: 'You pay into escrow',
      amount: '3995.00',
    });
    expect(sheet.total).toBe('3995.00');
  });

  it('never mentions the commission', () => {
    expect(JSON.stringify(sheet)).not.toMatch(/commission/i);
    expect(refinedSheet({ ...BUTTON, commission: null })).toEqual(sheet);
  });

  it('has the metal lines of the exact fractions on BigInt', () => {
    const gold: OracleMetal = {
      fraction: ratio(9583n, 10_000n),
      expanded: rational('0.0005'),
      rate: '4182.40',
    };
    const silver: OracleMetal = { fraction: ratio(30n, 1000n), expanded: rational('0.002'), rate: '52.35' };
    const expectLine = (key: string, metal: OracleMetal) => {
      const { ounces, cents: amount } = oracleLine('31.05', metal);
      expect(line(sheet, key)?.quantity).toEqual({ value: ounces, unit: 'oz t' });
      expect(cents(line(sheet, key)?.amount)).toBe(amount);
    };
    expectLine('fine:Au', gold);
    expectLine('fine:Ag', silver);
    expect(isExpandedRight(cents(sheet.melt.expanded), '31.05', '0.01', [gold, silver])).toBe(true);
    expect(isExpandedRight(cents(sheet.melt.expanded) + 1n, '31.05', '0.01', [gold, silver])).toBe(false);
  });

  it('names the quotes that it used and no other, the version and the moment', () => {
    expect(sheet.quotes.map((quote) => quote.id)).toEqual(['q-au', 'q-ag']);
    expect(sheet).toMatchObject({ engineVersion: ENGINE_VERSION, moment: 'provisional', currency: 'USD' });
  });

  it('shows the working of every line with its units', () => {
    for (const entry of sheet.lines) expect(entry.working.length).toBeGreaterThan(0);
    expect(line(sheet, 'fine:Ag')?.working).toEqual([
      '31.05 g × 30 ‰ = 0.9315 g fine',
      '0.9315 g ÷ 31.1034768 g/oz t = 0.029948420428… oz t, rounded to 0.029948 oz t',
      '0.029948 oz t × US$ 52.35/oz t = US$ 1.5677778, rounded to US$ 1.57',
    ]);
    expect(line(sheet, 'total')?.working).toEqual(['3950.00 + 45.00 = US$ 3995.00']);
  });

  it('shares the variance out among mass and assays', () => {
    expect(sheet.melt.shares.map(({ input }) => input)).toEqual(['mass', 'assay:Au', 'assay:Ag']);
    const tenths = sheet.melt.shares.map(({ percent }) => BigInt(percent.replace('.', '')));
    expect(tenths.reduce((sum, next) => sum + next, 0n)).toBe(1000n);
  });

  it('survives the wire unchanged', () => {
    expect(JSON.parse(JSON.stringify(sheet))).toEqual(sheet);
  });
});

describe('the seller’s sheet', () => {
  it('takes the commission off, passes the parcel through and ends with what goes to him', () => {
    const sheet = refinedSheet({ ...BUTTON, audience: 'seller' });
    expect(keys(sheet)).toEqual([
      'gross',
      'fine:Au',
      'fine:Ag',
      'melt',
      'price',
      'commission',
      'shipping',
      'net',
    ]);
    expect(line(sheet, 'commission')).toMatchObject({ rate: { value: '4', unit: '%' }, amount: '-158.00' });
    expect(line(sheet, 'net')).toMatchObject({ label: 'Goes to you', amount: '3837.00' });
    expect(line(sheet, 'net')?.working).toEqual(['3950.00 − 158.00 + 45.00 = US$ 3837.00']);
  });

  it.each([
    ['20.00', '1.5', '-2.00', 'Lifted to the minimum of US$ 2.00'],
    ['1.20', '4', '-1.20', 'Minimum US$ 2.00; held to the price, US$ 1.20'],
  ])('says why the commission on US$ %s at %s %% is %s', (amount, percent, commission, words) => {
    const sheet = refinedSheet({
      ...BUTTON,
      audience: 'seller',
      price: { amount },
      commission: { method: 'bank_debit', percent, minimum: '2.00' },
    });
    expect(line(sheet, 'commission')?.amount).toBe(commission);
    expect(line(sheet, 'commission')?.working.at(-1)).toBe(words);
    expect(line(sheet, 'commission')?.working[0]).toContain('paid by bank debit');
  });

  it('is refused without the commission it names', () => {
    expect(refusals({ audience: 'seller', commission: null })).toEqual(['commission-missing at /commission']);
  });
});

describe('without a price', () => {
  it('ends at the melt value', () => {
    const sheet = refinedSheet({ ...BUTTON, price: null, shipping: null, moment: 'estimated' });
    expect(keys(sheet)).toEqual(['gross', 'fine:Au', 'fine:Ag', 'melt']);
    expect(sheet).toMatchObject({ price: null, percentOfMelt: null, shipping: null, total: null });
  });

  it('refuses a parcel charge of its own', () => {
    expect(refusals({ price: null })).toEqual(['shipping-without-price at /shipping']);
  });
});

describe('what is assumed', () => {
  it('is listed for the metals paid for only', () => {
    const [gold, , copper] = BUTTON.contents;
    const contents = [{ ...gold, uncertainty: null }, copper] as RefinedSheetInput['contents'];
    const sheet = refinedSheet({ ...BUTTON, readability: null, contents });
    expect(sheet.assumed.map(({ field, value }) => [field, value])).toEqual([
      ['/readability', '0.01 g'],
      ['/contents/0/uncertainty', '0.5 ‰'],
    ]);
  });

  it('is widened by the class of the balance', () => {
    const plainBalance = refinedSheet(BUTTON);
    const classTwo = refinedSheet({ ...BUTTON, balanceClass: 'II' });
    expect(cents(classTwo.melt.expanded)).toBeGreaterThan(cents(plainBalance.melt.expanded));
    expect(classTwo.melt.value).toBe(plainBalance.melt.value);
  });
});

describe('other units and steps', () => {
  it('shows the exact factor of a mass that was not weighed in grams', () => {
    const sheet = refinedSheet({ ...BUTTON, gross: { value: '1.5', unit: 'ozt' }, readability: null });
    expect(line(sheet, 'gross')?.quantity).toEqual({ value: '1.5', unit: 'oz t' });
    expect(line(sheet, 'gross')?.working[0]).toBe('1.5 oz t × 31.1034768 g = 46.6552152 g, exact');
  });

  it('rounds the payable mass to a coarser step where the terms name one', () => {
    const sheet = refinedSheet({ ...BUTTON, weightStep: '0.001' });
    expect(line(sheet, 'fine:Au')?.quantity).toEqual({ value: '0.957', unit: 'oz t' });
    expect(line(sheet, 'fine:Au')?.amount).toBe('4002.56');
  });

  it('takes karat for the fraction that it is', () => {
    const [gold] = BUTTON.contents;
    const contents = [{ ...gold, fineness: { value: '22', unit: 'karat' } }] as RefinedSheetInput['contents'];
    expect(line(refinedSheet({ ...BUTTON, contents }), 'fine:Au')?.working[0]).toBe(
      '31.05 g × 22/24 = 28.4625 g fine',
    );
  });
});

describe('bad input', () => {
  it.each<[string, object, string[]]>([
    ['no quote for silver', { quotes: BUTTON.quotes.slice(0, 1) }, ['quote-missing at /quotes']],
    [
      'two quotes for gold',
      { quotes: [BUTTON.quotes[0], BUTTON.quotes[0]] },
      ['quote-repeated at /quotes/1'],
    ],
    ['nothing paid for', { contents: [BUTTON.contents[2]] }, ['nothing-paid-for at /contents']],
    ['a negative price', { price: { amount: '-1.00' } }, ['amount-negative at /price/amount']],
    ['a price in fractions', { price: { amount: '10.005' } }, ['too-many-decimals at /price/amount']],
    ['a negative parcel', { shipping: { amount: '-0.01' } }, ['amount-negative at /shipping/amount']],
    ['a step of zero', { weightStep: '0' }, ['too-small at /weightStep']],
    [
      'several things at once',
      { gross: { value: '0', unit: 'g' }, price: { amount: 'ten' }, shipping: { amount: '1,00' } },
      ['too-small at /gross/value', 'not-a-decimal at /price/amount', 'decimal-comma at /shipping/amount'],
    ],
  ])('refuses %s', (_, change, expected) => {
    expect(refusals(change)).toEqual(expected);
  });

  it('refuses copper that wants to be paid for', () => {
    const contents = BUTTON.contents.map((content) => ({ ...content, paidFor: true }));
    expect(refusals({ contents })).toEqual(['not-payable at /contents/2/paidFor']);
  });
});

const lots = fc.record({
  milligrams: fc.integer({ min: 1, max: 9_000_000 }),
  parts: fc.uniqueArray(
    fc.record({
      metal: fc.constantFrom(...METALS),
      isKarat: fc.boolean(),
      size: fc.integer({ min: 1, max: 6 }),
      expandedTenths: fc.integer({ min: 1, max: 99 }),
      rateCents: fc.integer({ min: 1, max: 900_000 }),
    }),
    { minLength: 1, maxLength: 4, selector: ({ metal }) => metal },
  ),
  priceCents: fc.integer({ min: 0, max: 90_000_000 }),
  shippingCents: fc.option(fc.integer({ min: 0, max: 50_000 })),
  percentHundredths: fc.integer({ min: 0, max: 1000 }),
  audience: fc.constantFrom('buyer' as const, 'seller' as const),
});

const decimalText = (units: number, places: number) => {
  const digits = units.toString().padStart(places + 1, '0');
  return `${digits.slice(0, -places)}.${digits.slice(-places)}`;
};

type Lot = typeof lots extends fc.Arbitrary<infer Value> ? Value : never;

function inputOf(lot: Lot): { input: RefinedSheetInput; metals: Map<Metal, OracleMetal>; grams: string } {
  const grams = decimalText(lot.milligrams, 3);
  const metals = new Map<Metal, OracleMetal>();
  const contents = lot.parts.map(({ metal, isKarat, size, expandedTenths, rateCents }) => {
    const expanded = decimalText(expandedTenths, 1);
    metals.set(metal, {
      fraction: isKarat ? ratio(BigInt(size), 24n) : ratio(BigInt(size) * 37n, 1000n),
      expanded: times(rational(expanded), ratio(1n, 1000n)),
      rate: decimalText(rateCents, 2),
    });
    return {
      metal,
      fineness: isKarat
        ? ({ value: String(size), unit: 'karat' } as const)
        : ({ value: String(size * 37), unit: 'permille' } as const),
      uncertainty: { value: expanded, unit: 'permille' as const },
      method: 'none' as const,
      paidFor: true,
    };
  });
  const quotes = [...metals].map(([metal, { rate }]) => ({
    id: null,
    metal,
    usdPerTroyOunce: rate,
    at: null,
    source: 'x',
  }));
  const input: RefinedSheetInput = {
    gross: { value: grams, unit: 'g' },
    readability: { value: '0.001', unit: 'g' },
    contents,
    quotes,
    price: { amount: decimalText(lot.priceCents, 2) },
    shipping: lot.shippingCents === null ? null : { amount: decimalText(lot.shippingCents, 2) },
    commission: { method: 'card', percent: decimalText(lot.percentHundredths, 2), minimum: '2.00' },
    moment: 'final',
    audience: lot.audience,
  };
  return { input, metals, grams };
}

describe('properties', () => {
  it('agrees line by line, in sum and band, with exact fractions on BigInt', () => {
    fc.assert(
      fc.property(lots, (lot) => {
        const { input, metals, grams } = inputOf(lot);
        const sheet = refinedSheet(input);
        let sum = 0n;
        for (const [metal, oracle] of metals) {
          const { ounces, cents: amount } = oracleLine(grams, oracle);
          expect(line(sheet, `fine:${metal}`)?.quantity?.value).toBe(ounces);
          expect(cents(line(sheet, `fine:${metal}`)?.amount)).toBe(amount);
          sum += amount;
        }
        expect(cents(sheet.melt.value)).toBe(sum);
        expect(isExpandedRight(cents(sheet.melt.expanded), grams, '0.001', [...metals.values()])).toBe(true);
      }),
    );
  });

  it('can be re-added by hand from its printed lines', () => {
    fc.assert(
      fc.property(lots, (lot) => {
        const { input } = inputOf(lot);
        const sheet = refinedSheet(input);
        const sumOf = (kind: string) =>
          sheet.lines
            .filter((entry) => entry.kind === kind)
            .reduce((sum, { amount }) => sum + cents(amount), 0n);
        expect(sumOf('metal')).toBe(cents(line(sheet, 'melt')?.amount));
        expect(sumOf('price') + sumOf('charge')).toBe(sumOf('total'));
        expect(sumOf('total')).toBe(cents(sheet.total));
        const { value, low, high, expanded } = sheet.melt;
        expect(cents(value) + cents(expanded)).toBe(cents(high));
        expect(cents(low)).toBe(cents(value) > cents(expanded) ? cents(value) - cents(expanded) : 0n);
      }),
    );
  });

  it('leaves between the buyer’s and the seller’s sheet exactly the commission', () => {
    fc.assert(
      fc.property(lots, (lot) => {
        const { input } = inputOf(lot);
        const buyer = refinedSheet({ ...input, audience: 'buyer' });
        const seller = refinedSheet({ ...input, audience: 'seller' });
        const rate = { percent: decimalText(lot.percentHundredths, 2), minimumMinor: 200n };
        expect(cents(buyer.total) - cents(seller.total)).toBe(commissionFor(BigInt(lot.priceCents), rate));
        expect(buyer.melt).toEqual(seller.melt);
      }),
    );
  });
});
