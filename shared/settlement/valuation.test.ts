import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dec, fixed } from '../decimal.ts';
import { MeasureError } from '../domain-error.ts';
import { fineGrams } from './lot-measures.ts';
import { toFraction } from '../fineness.ts';
import { METALS } from '../metals.ts';
import type { QuoteRef } from './sheet-types.ts';
import { valuate, type ValuationRequest } from './valuation.ts';

const EXAMPLE: ValuationRequest = {
  mass: { value: '12.34', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
  contents: [
    {
      metal: 'Au',
      fineness: { value: '916.7', unit: 'permille' },
      uncertainty: { value: '0.5', unit: 'permille' },
    },
  ],
  quotes: { Au: '2000.00' },
};

const CURRENT: QuoteRef[] = [
  { id: 'q1', metal: 'Au', usdPerTroyOunce: '4000.00', at: '2026-12-01T12:00:00.000Z', source: 'day feed' },
  { id: 'q2', metal: 'Ag', usdPerTroyOunce: '50.00', at: '2026-12-01T12:00:00.000Z', source: 'day feed' },
];

const withContent = (change: object): ValuationRequest =>
  ({ ...EXAMPLE, contents: [{ ...EXAMPLE.contents[0], ...change }] }) as ValuationRequest;

function refusals(request: unknown, current: QuoteRef[] = []): string[] {
  try {
    valuate(request as ValuationRequest, current);
  } catch (error) {
    if (error instanceof MeasureError) return error.issues.map(({ code, field }) => `${code} at ${field}`);
    throw error;
  }
  return [];
}

describe('the published example of the API', () => {
  it('answers exactly', () => {
    expect(valuate(EXAMPLE)).toEqual({
      metals: [
        {
          metal: 'Au',
          fineGrams: '11.312078',
          fineTroyOunces: '0.363692',
          value: '727.38',
          quote: { usdPerTroyOunce: '2000.00', at: null, source: 'given' },
        },
      ],
      total: { currency: 'USD', value: '727.38', low: '726.86', high: '727.90' },
      assumed: [],
    });
  });
});

describe('what is left out', () => {
  it('assumes readability and uncertainty, and says so', () => {
    const { contents } = withContent({ uncertainty: undefined });
    const answer = valuate({ mass: EXAMPLE.mass, contents, quotes: EXAMPLE.quotes });
    expect(answer.assumed).toEqual([
      { field: '/readability', value: '0.01 g', reason: 'Not given: one unit of the last digit typed.' },
      {
        field: '/contents/0/uncertainty',
        value: '5 ‰',
        reason: 'Not given: default of the method “No method named”, expanded (k = 2), from memory.',
      },
    ]);
  });

  it.each([
    ['fire_assay', '0.5 ‰'],
    ['titration', '1 ‰'],
    ['icp_pgm', '3 ‰'],
    ['gravimetric_pgm', '3 ‰'],
    ['difference', '0.05 ‰'],
    ['xrf', '5 ‰'],
    ['density', '30 ‰'],
    ['touchstone', '15 ‰'],
    ['none', '5 ‰'],
  ])('assumes for %s an expanded uncertainty of %s (from memory)', (method, value) => {
    const answer = valuate(withContent({ uncertainty: null, method }));
    expect(answer.assumed.map((assumed) => assumed.value)).toEqual([value]);
  });

  it('takes one unit of the last digit in the unit typed', () => {
    const answer = valuate({ ...EXAMPLE, mass: { value: '3', unit: 'dwt' }, readability: null });
    expect(answer.assumed[0]).toMatchObject({ field: '/readability', value: '1 dwt' });
  });

  it('uses current quotes where none is given, and names them', () => {
    const answer = valuate({ ...EXAMPLE, quotes: undefined }, CURRENT);
    expect(answer.metals[0]?.quote).toEqual({
      usdPerTroyOunce: '4000.00',
      at: '2026-12-01T12:00:00.000Z',
      source: 'day feed',
    });
    expect(answer.total.value).toBe('1454.77');
  });

  it('prefers a given quote to the current one', () => {
    expect(valuate(EXAMPLE, CURRENT).total.value).toBe('727.38');
  });

  it('refuses a metal that has no quote at all', () => {
    expect(refusals({ ...EXAMPLE, quotes: {} })).toEqual(['quote-missing at /quotes']);
  });
});

describe('several metals', () => {
  it('lists them in one order and adds their rounded values', () => {
    const answer = valuate(
      {
        ...EXAMPLE,
        quotes: {},
        contents: [
          { metal: 'Ag', fineness: { value: '60', unit: 'permille' } },
          { metal: 'Au', fineness: { value: '14', unit: 'karat' } },
        ],
      },
      CURRENT,
    );
    expect(answer.metals.map(({ metal, value }) => [metal, value])).toEqual([
      ['Au', '925.73'],
      ['Ag', '1.19'],
    ]);
    expect(answer.total.value).toBe('926.92');
  });
});

describe('bad input, each at its field', () => {
  it.each<[string, object, string]>([
    ['mass zero', { mass: { value: '0', unit: 'g' } }, 'too-small at /mass/value'],
    ['mass negative', { mass: { value: '-12.34', unit: 'g' } }, 'too-small at /mass/value'],
    ['mass 1e9 as text', { mass: { value: '1e9', unit: 'g' } }, 'not-a-decimal at /mass/value'],
    [
      'mass of a thousand tonnes',
      { mass: { value: '1000000000', unit: 'g' } },
      'mass-too-large at /mass/value',
    ],
    ['15 decimals', { mass: { value: '1.123456789012345', unit: 'g' } }, 'too-many-decimals at /mass/value'],
    ['comma', { mass: { value: '12,34', unit: 'g' } }, 'decimal-comma at /mass/value'],
    ['unit missing', { mass: { value: '12.34' } }, 'unit-missing at /mass/unit'],
    ['unit unknown', { mass: { value: '12.34', unit: 'ounce' } }, 'unit-unknown at /mass/unit'],
    ['readability zero', { readability: { value: '0', unit: 'g' } }, 'too-small at /readability/value'],
    [
      'readability above',
      { readability: { value: '13', unit: 'g' } },
      'readability-too-large at /readability/value',
    ],
    ['no contents', { contents: [] }, 'contents-missing at /contents'],
    ['quote zero', { quotes: { Au: '0' } }, 'too-small at /quotes/Au'],
    ['quote negative', { quotes: { Au: '-1' } }, 'too-small at /quotes/Au'],
    ['quote with comma', { quotes: { Au: '2000,00' } }, 'decimal-comma at /quotes/Au'],
    ['quote enormous', { quotes: { Au: '1000000.01' } }, 'too-large at /quotes/Au'],
    ['quote of rhodium', { quotes: { Rh: '1' } }, 'metal-unknown at /quotes/Rh'],
  ])('refuses %s', (_, change, expected) => {
    expect(refusals({ ...EXAMPLE, ...change })).toContain(expected);
  });

  it.each<[string, object, string]>([
    [
      'fineness 0',
      { fineness: { value: '0', unit: 'permille' } },
      'fineness-too-low at /contents/0/fineness/value',
    ],
    [
      '1000.1',
      { fineness: { value: '1000.1', unit: 'permille' } },
      'fineness-too-high at /contents/0/fineness/value',
    ],
    [
      'karat 25',
      { fineness: { value: '25', unit: 'karat' } },
      'fineness-too-high at /contents/0/fineness/value',
    ],
    ['no unit', { fineness: { value: '585' } }, 'unit-missing at /contents/0/fineness/unit'],
    [
      'U zero',
      { uncertainty: { value: '0', unit: 'permille' } },
      'fineness-too-low at /contents/0/uncertainty/value',
    ],
    ['copper', { metal: 'Cu' }, 'not-payable at /contents/0/paidFor'],
    ['no metal', { metal: 'Xx' }, 'metal-unknown at /contents/0/metal'],
    ['method', { method: 'guess' }, 'method-unknown at /contents/0/method'],
  ])('refuses a content with %s', (_, change, expected) => {
    expect(refusals(withContent(change))).toContain(expected);
  });

  it('refuses fractions that make more than the whole, and a metal given twice', () => {
    const gold = { metal: 'Au', fineness: { value: '900', unit: 'permille' } };
    const silver = { metal: 'Ag', fineness: { value: '100.1', unit: 'permille' } };
    expect(refusals({ ...EXAMPLE, contents: [gold, silver] })).toEqual(['fractions-over-whole at /contents']);
    const twice = { metal: 'Au', fineness: { value: '50', unit: 'permille' } };
    expect(refusals({ ...EXAMPLE, contents: [gold, twice] })).toEqual([
      'metal-repeated at /contents/1/metal',
    ]);
  });

  it('tells everything at once', () => {
    const request = {
      mass: { value: '0', unit: 'g' },
      readability: { value: 'x', unit: 'g' },
      contents: [
        { metal: 'Au', fineness: { value: '25', unit: 'karat' } },
        { metal: 'Ag', fineness: { value: '0', unit: 'permille' } },
      ],
    };
    expect(refusals(request)).toEqual([
      'too-small at /mass/value',
      'not-a-decimal at /readability/value',
      'fineness-too-high at /contents/0/fineness/value',
      'fineness-too-low at /contents/1/fineness/value',
    ]);
  });
});

describe('published checks on price (trade arithmetic, computed)', () => {
  it('has 2000.00 $/oz t as 64.301493 $/g, 37.62 $/g at 585 ‰', () => {
    const perGram = dec('2000.00').div('31.1034768');
    expect(fixed(perGram, 6)).toBe('64.301493');
    expect(fixed(perGram, 2)).toBe('64.30');
    expect(fixed(fineGrams(perGram, toFraction({ value: '585', unit: 'permille' })), 2)).toBe('37.62');
    expect(fixed(dec('25.00').div('31.1034768'), 5)).toBe('0.80377');
  });

  it('values a gram of pure gold at 64.30 and of 585 at 37.62 through the whole engine', () => {
    const gram = (fineness: string) =>
      valuate({
        mass: { value: '1', unit: 'g' },
        readability: { value: '0.001', unit: 'g' },
        contents: [{ metal: 'Au', fineness: { value: fineness, unit: 'permille' } }],
        quotes: { Au: '2000.00' },
      }).total.value;
    expect(gram('1000')).toBe('64.30');
    expect(gram('585')).toBe('37.62');
  });
});

describe('properties', () => {
  it('keeps the value inside its band, and the band grows with the uncertainty', () => {
    const arbitrary = fc.record({
      metal: fc.constantFrom(...METALS),
      milligrams: fc.integer({ min: 10, max: 5_000_000 }),
      tenths: fc.integer({ min: 1, max: 10_000 }),
      expanded: fc.integer({ min: 1, max: 200 }),
    });
    fc.assert(
      fc.property(arbitrary, ({ metal, milligrams, tenths, expanded }) => {
        const at = (uncertaintyTenths: number) =>
          valuate({
            mass: { value: fixed(dec(BigInt(milligrams)).div(1000), 3), unit: 'g' },
            contents: [
              {
                metal,
                fineness: { value: fixed(dec(BigInt(tenths)).div(10), 1), unit: 'permille' },
                uncertainty: { value: fixed(dec(BigInt(uncertaintyTenths)).div(10), 1), unit: 'permille' },
              },
            ],
            quotes: { [metal]: '1234.56' },
          }).total;
        const [narrow, wide] = [at(expanded), at(expanded + 50)];
        expect(narrow.value).toBe(wide.value);
        expect(dec(narrow.low).lte(narrow.value) && dec(narrow.high).gte(narrow.value)).toBe(true);
        expect(dec(wide.low).lte(narrow.low) && dec(wide.high).gte(narrow.high)).toBe(true);
        expect(dec(wide.low).gte(0)).toBe(true);
      }),
    );
  });
});
