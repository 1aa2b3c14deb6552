import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { over, plus, ratio, rational, times, toPlaces } from './testing/rational.ts';
import { dec } from './decimal.ts';
import { MeasureError } from './domain-error.ts';
import { rankingKeys, type RankingInput } from './main-metal.ts';

const LOT: RankingInput = {
  gross: { value: '100.00', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
  contents: [
    {
      metal: 'Ag',
      fineness: { value: '400', unit: 'permille' },
      uncertainty: { value: '2', unit: 'permille' },
      method: 'titration',
      paidFor: true,
    },
    {
      metal: 'Au',
      fineness: { value: '585', unit: 'permille' },
      uncertainty: { value: '1', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
  ],
  priceMinor: 360_000n,
  grade: 'certified',
  dayRates: { Au: '2000.00', Ag: '25.00' },
};

function refusal(change: object): string {
  try {
    rankingKeys({ ...LOT, ...change } as RankingInput);
  } catch (error) {
    if (error instanceof MeasureError) return `${error.code} at ${error.field}`;
    throw error;
  }
  return 'accepted';
}

describe('ranking keys', () => {
  it('take the paid metal of greatest value, and add the others as its grams at the day’s rates', () => {
    expect(rankingKeys(LOT)).toEqual({
      mainMetal: 'Au',
      mainFineGrams: '58.500000',
      equivalentGrams: '59.000000',
      pricePerFineGram: '61.01694915',
    });
  });

  it('go by value, not by mass, and change with the day’s rates', () => {
    expect(rankingKeys({ ...LOT, dayRates: { Au: '10.00', Ag: '25.00' } }).mainMetal).toBe('Ag');
  });

  it('leave a metal out that is not paid for', () => {
    const contents = LOT.contents.map((content) => ({ ...content, paidFor: content.metal === 'Ag' }));
    expect(rankingKeys({ ...LOT, contents })).toMatchObject({ mainMetal: 'Ag', mainFineGrams: '40.000000' });
  });

  it.each(['declared', 'examined'] as const)('rank a %s lot at the lower end of its band', (grade) => {
    const keys = rankingKeys({ ...LOT, grade });
    // By hand: u² = (0.59·0.01/√12)² + (100·0.0005)² + (100·0.001·25/2000)²; E − 2u.
    expect(keys.equivalentGrams).toBe('58.899911');
    expect(keys.mainFineGrams).toBe('58.500000');
    expect(dec(keys.pricePerFineGram ?? '0').gt('61.01694915')).toBe(true);
  });

  it('never let a wider uncertainty rank a declared lot better', () => {
    const at = (uncertainty: number) =>
      rankingKeys({
        ...LOT,
        grade: 'declared',
        contents: LOT.contents.map((content) => ({
          ...content,
          uncertainty: { value: String(uncertainty), unit: 'permille' as const },
        })),
      });
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 200 }), fc.integer({ min: 1, max: 200 }), (first, second) => {
        const [narrow, wide] = first < second ? [first, second] : [second, first];
        expect(dec(at(narrow).pricePerFineGram ?? '0').lte(at(wide).pricePerFineGram ?? '0')).toBe(true);
      }),
    );
  });

  it('have no price per gram without a price, or when the band reaches down to nothing', () => {
    expect(rankingKeys({ ...LOT, priceMinor: null }).pricePerFineGram).toBeNull();
    const [silver] = LOT.contents;
    const vague = [
      {
        ...silver,
        fineness: { value: '10', unit: 'permille' },
        uncertainty: { value: '30', unit: 'permille' },
      },
    ] as RankingInput['contents'];
    expect(rankingKeys({ ...LOT, contents: vague, grade: 'declared' })).toMatchObject({
      equivalentGrams: '0.000000',
      pricePerFineGram: null,
    });
  });

  it('refuse what cannot be ranked', () => {
    expect(refusal({ dayRates: { Au: '2000.00' } })).toBe('quote-missing at /dayRates/Ag');
    expect(refusal({ dayRates: { Au: '0', Ag: '25.00' } })).toBe('too-small at /dayRates/Au');
    const unpaid = LOT.contents.map((content) => ({ ...content, paidFor: false }));
    expect(refusal({ contents: unpaid })).toBe('nothing-paid-for at /contents');
    expect(refusal({ gross: { value: '0', unit: 'g' } })).toBe('too-small at /gross/value');
  });

  it('agree with exact fractions on BigInt', () => {
    const sizes = fc.integer({ min: 1, max: 500 });
    fc.assert(
      fc.property(sizes, sizes, fc.integer({ min: 1, max: 9_999_999 }), (gold, silver, price) => {
        const keys = rankingKeys({
          ...LOT,
          priceMinor: BigInt(price),
          contents: LOT.contents.map((content) => ({
            ...content,
            fineness: { value: String(content.metal === 'Au' ? gold : silver), unit: 'permille' as const },
          })),
        });
        const grams = (permille: number) => ratio(BigInt(permille), 10n);
        const isGold = gold * 2000 >= silver * 25;
        const equivalent = isGold
          ? plus(grams(gold), times(grams(silver), rational('25'), ratio(1n, 2000n)))
          : plus(grams(silver), times(grams(gold), rational('2000'), ratio(1n, 25n)));
        expect(keys.mainMetal).toBe(isGold ? 'Au' : 'Ag');
        expect(keys.equivalentGrams).toBe(toPlaces(equivalent, 6));
        expect(keys.pricePerFineGram).toBe(toPlaces(over(ratio(BigInt(price), 100n), equivalent), 8));
      }),
    );
  });
});
