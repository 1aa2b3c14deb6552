import { describe, expect, it } from 'vitest';
import { MeasureError } from '../domain-error.ts';
import { differingPointers, recompute } from './recompute.ts';
import { refinedSheetInputSchema } from './refined-sheet-input.ts';
import { refinedSheet } from './refined-sheet.ts';
import type { RefinedSheetInput, SettlementSheet } from './sheet-types.ts';

const INPUT: RefinedSheetInput = {
  gross: { value: '20.00', unit: 'dwt' },
  readability: null,
  balanceClass: 'II',
  contents: [
    {
      metal: 'Pt',
      fineness: { value: '95', unit: 'percent' },
      uncertainty: null,
      method: 'icp_pgm',
      paidFor: true,
    },
    {
      metal: 'Ru',
      fineness: { value: '50', unit: 'permille' },
      uncertainty: null,
      method: 'none',
      paidFor: false,
    },
  ],
  quotes: [
    { id: '17', metal: 'Pt', usdPerTroyOunce: '1604.00', at: '2026-12-01T14:02:00.000Z', source: 'day feed' },
  ],
  price: { amount: '1500.00' },
  shipping: { amount: '30.00' },
  commission: { method: 'card', percent: '4', minimum: '2.00' },
  moment: 'final',
  audience: 'seller',
};

/** What a JSON column gives back. */
const stored = <T>(value: T): T => JSON.parse(JSON.stringify(value)) as T;

describe('recompute', () => {
  it('finds a stored sheet equal, after the database gave input and sheet back', () => {
    const sheet = refinedSheet(INPUT);
    const again = recompute(refinedSheetInputSchema.parse(stored(INPUT)), stored(sheet));
    expect(again).toEqual({ isEqual: true, differences: [], sheet });
  });

  it('does not mind in which order the keys come back', () => {
    const sheet = refinedSheet(INPUT);
    const reversed = Object.fromEntries(Object.entries(sheet).reverse()) as SettlementSheet;
    expect(recompute(INPUT, reversed).isEqual).toBe(true);
  });

  it('points at a cent that does not belong', () => {
    const sheet = stored(refinedSheet(INPUT));
    const changed = { ...sheet, total: '1470.01', melt: { ...sheet.melt, high: '0.00' } };
    const { isEqual, differences } = recompute(INPUT, changed);
    expect(isEqual).toBe(false);
    expect(differences).toEqual(['/melt/high', '/total']);
  });

  it('notices an input that was changed afterwards', () => {
    const sheet = refinedSheet(INPUT);
    const heavier = { ...INPUT, gross: { ...INPUT.gross, value: '20.01' } };
    expect(recompute(heavier, sheet).differences).toContain('/melt/value');
  });

  it('computes a sheet of the first version by its own rules, and knows no linked price there', () => {
    const first = refinedSheet(INPUT, '1');
    expect(first.engineVersion).toBe('1');
    expect(recompute(INPUT, stored(first))).toEqual({ isEqual: true, differences: [], sheet: first });
    const linked = { ...INPUT, price: { percent: '98.2' } };
    expect(() => recompute(linked, first)).toThrowError(
      expect.objectContaining({ code: 'engine-version-unknown' }),
    );
  });

  it('computes a linked price as its percentage of melt, rounded once, and finds it again', () => {
    const linked: RefinedSheetInput = { ...INPUT, price: { percent: '98.20' }, moment: 'estimated' };
    const sheet = refinedSheet(refinedSheetInputSchema.parse(stored(linked)));
    // 20.00 dwt = 1 oz t; 0.95 × 1604.00 = 1523.80; 98.20 % of it is 1496.3716
    expect(sheet).toMatchObject({ melt: { value: '1523.80' }, price: '1496.37', percentOfMelt: '98.20' });
    expect(sheet.lines.find(({ key }) => key === 'price')).toEqual({
      key: 'price',
      kind: 'price',
      label: 'Price, 98.20 % of melt',
      quantity: null,
      rate: { value: '98.20', unit: '%' },
      amount: '1496.37',
      working: ['98.20 % of US$ 1523.80, rounded once: US$ 1496.37'],
    });
    expect(recompute(linked, stored(sheet)).isEqual).toBe(true);
  });

  it.each(['0', '-1', '98.20001', 'x'])('refuses %s as a percentage at its field', (percent) => {
    expect(() => refinedSheet({ ...INPUT, price: { percent } })).toThrowError(
      expect.objectContaining({ field: '/price/percent' }),
    );
  });

  it('refuses a sheet made with rules that are not kept here', () => {
    const sheet = { ...refinedSheet(INPUT), engineVersion: '0' };
    expect(() => recompute(INPUT, sheet)).toThrowError(
      expect.objectContaining({ code: 'engine-version-unknown' }),
    );
    expect(() => recompute(INPUT, sheet)).toThrow(MeasureError);
  });
});

describe('differingPointers', () => {
  it.each<[unknown, unknown, string[]]>([
    [{ a: 1 }, { a: 1 }, []],
    [{ a: 1 }, { a: 2 }, ['/a']],
    [{ a: [1, 2] }, { a: [1] }, ['/a/1']],
    [{ a: null }, { a: {} }, ['/a']],
    [[1], { 0: 1 }, ['']],
    [{ a: { b: 'x', c: 'y' } }, { a: { b: 'z', c: 'w' } }, ['/a/b', '/a/c']],
    [{}, { extra: true }, ['/extra']],
  ])('finds between %j and %j: %j', (left, right, expected) => {
    expect(differingPointers(left, right)).toEqual(expected);
  });
});

describe('shape of the stored input', () => {
  it('takes a whole input and gives it back unchanged', () => {
    expect(refinedSheetInputSchema.parse(stored(INPUT))).toEqual(INPUT);
  });

  it.each<[string, object]>([
    ['a number in place of text', { gross: { value: 20, unit: 'dwt' } }],
    ['an unknown unit', { gross: { value: '20', unit: 'tola' } }],
    ['an unknown audience', { audience: 'house' }],
    ['an unknown moment', { moment: 'later' }],
    ['an unknown field', { discount: '5' }],
    ['no quotes field', { quotes: undefined }],
    ['a quote of an unquoted metal', { quotes: [{ ...INPUT.quotes[0], metal: 'Rh' }] }],
    ['a class that does not exist', { balanceClass: 'V' }],
    ['a method that does not exist', { contents: [{ ...INPUT.contents[0], method: 'guess' }] }],
    ['an overlong number', { price: { amount: '1'.repeat(41) } }],
  ])('refuses %s', (_, change) => {
    expect(refinedSheetInputSchema.safeParse({ ...INPUT, ...change }).success).toBe(false);
  });
});
