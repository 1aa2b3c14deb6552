import { describe, expect, it } from 'vitest';
import { dec, fixed } from '../decimal.ts';
import { MeasureError } from '../domain-error.ts';
import { fineContent } from './fine-content.ts';
import { measureLot, type LotEntry } from './lot-measures.ts';

const LOT: LotEntry = {
  gross: { value: '125.40', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
  contents: [
    {
      metal: 'Cu',
      fineness: { value: '30', unit: 'percent' },
      uncertainty: null,
      method: 'xrf',
      paidFor: false,
    },
    {
      metal: 'Ag',
      fineness: { value: '100', unit: 'permille' },
      uncertainty: { value: '2', unit: 'permille' },
      method: 'titration',
      paidFor: false,
    },
    {
      metal: 'Au',
      fineness: { value: '585.0', unit: 'permille' },
      uncertainty: { value: '1.0', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
  ],
};

describe('fine content', () => {
  it('of the product’s own case is 73.359 g with U = 0.1254 g (computed)', () => {
    const [gold] = fineContent(LOT);
    expect(gold).toMatchObject({ metal: 'Au', paidFor: true, grams: '73.359000', troyOunces: '2.358547' });
    expect(fixed(dec(gold?.expandedGrams ?? '0'), 4)).toBe('0.1254');
  });

  it('lists the quoted metals in one order, paid for or not, and leaves the others out', () => {
    expect(fineContent(LOT).map(({ metal, paidFor }) => [metal, paidFor])).toEqual([
      ['Au', true],
      ['Ag', false],
    ]);
  });

  it('needs at least a mass that is one', () => {
    expect(() => fineContent({ ...LOT, gross: { value: '0', unit: 'g' } })).toThrow(MeasureError);
  });
});

describe('measures of a lot', () => {
  it('keep mass and fractions exact and name what was assumed of the metals paid for', () => {
    const measures = measureLot({ ...LOT, readability: null });
    expect(measures.grossGrams.toFixed()).toBe('125.4');
    expect(measures.readability).toEqual({ value: '0.01', unit: 'g' });
    expect(fixed(measures.massUncertaintyGrams, 6)).toBe('0.002887');
    expect(measures.assumed.map(({ field }) => field)).toEqual(['/readability']);
    expect(measures.contents.map(({ standardUncertainty }) => standardUncertainty.toFixed())).toEqual([
      '0.0025',
      '0.001',
      '0.0005',
    ]);
  });

  it('turn a readability in another unit into grams exactly', () => {
    const { massUncertaintyGrams } = measureLot({ ...LOT, readability: { value: '1', unit: 'mg' } });
    expect(fixed(massUncertaintyGrams, 9)).toBe('0.000288675');
  });

  it('put every refusal at the pointer of the mass that they were given', () => {
    const gather = () =>
      measureLot({ ...LOT, gross: { value: '1,5', unit: 'g' }, contents: [] }, '/received');
    expect(gather).toThrowError(
      expect.objectContaining({
        issues: [
          expect.objectContaining({ code: 'decimal-comma', field: '/received/value' }),
          expect.objectContaining({ code: 'contents-missing', field: '/contents' }),
        ],
      }),
    );
  });
});
