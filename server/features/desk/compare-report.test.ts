import { describe, expect, it } from 'vitest';
import { claimsBeyondReport, compareReport, type Comparison } from './compare-report.ts';

const gold = {
  element: 'Au',
  finenessPermille: '995.2',
  uncertaintyPermille: '0.5',
  method: 'fire_assay',
};
const silver = { ...gold, element: 'Ag', finenessPermille: '3.1' };
const same: Comparison = {
  form: 'button',
  itemDescription: 'One gold button',
  reportMass: { value: '31.20', unit: 'g' },
  lotMass: { value: '31.20', unit: 'g' },
  itemMark: null,
  results: [gold],
  contents: [{ ...gold, isUncertaintyAssumed: false, isPaidFor: true }],
};
const content = same.contents[0]!;
const row = (comparison: Comparison, label: string) =>
  compareReport(comparison).find((each) => each.label === label);

describe('comparing a report with its lot', () => {
  it('marks nothing where everything is the same', () => {
    expect(compareReport(same).filter((each) => each.differs)).toEqual([]);
  });

  it.each([
    ['31.21', false],
    ['31.22', false],
    ['31.23', true],
    ['31.2', false],
    ['31.3', false],
    ['31.4', true],
  ])('holds a mass of %s g against 31.20 g by the digits of both', (value, differs) => {
    const found = row({ ...same, reportMass: { value, unit: 'g' } }, 'Mass');
    expect(found).toMatchObject({ differs });
  });

  it('compares masses of different units exactly', () => {
    const reportMass = { value: '1.0031', unit: 'ozt' } as const;
    expect(row({ ...same, reportMass }, 'Mass')).toMatchObject({ onReport: '1.0031 oz t', differs: false });
  });

  it('marks a report without a mass', () => {
    expect(row({ ...same, reportMass: null }, 'Mass')).toMatchObject({ onReport: '–', differs: true });
  });

  it('never says that a mark agrees: a person must look', () => {
    expect(row({ ...same, itemMark: 'HV 7' }, 'Mark')).toMatchObject({ differs: false, isByEye: true });
    expect(row(same, 'Mark')).toMatchObject({ isByEye: false, note: 'The report names no mark.' });
  });

  it.each([
    ['Cast bar', true],
    ['Gold ingot', true],
    ['Grain, bag of', true],
    ['Button', false],
    ['A sample of metal', false],
  ])('reads the form from “%s”', (itemDescription, differs) => {
    expect(row({ ...same, itemDescription }, 'Form')).toMatchObject({ differs, isByEye: !differs });
  });

  it('says which way the fineness differs', () => {
    const contents = [{ ...content, finenessPermille: '996.000000000000' }];
    expect(row({ ...same, contents }, 'Gold: fineness')).toMatchObject({
      onLot: '996 ‰',
      differs: true,
      note: 'The lot states 0.8 ‰ more than the report.',
    });
  });

  it('marks an uncertainty that is narrower, and one that is invented', () => {
    const narrow = [{ ...content, uncertaintyPermille: '0.2' }];
    expect(row({ ...same, contents: narrow }, 'Gold: uncertainty')).toMatchObject({
      differs: true,
      note: 'The lot claims to be surer than the report.',
    });
    const results = [{ ...gold, uncertaintyPermille: null }];
    expect(row({ ...same, results }, 'Gold: uncertainty')).toMatchObject({ differs: true });
    const contents = [{ ...content, isUncertaintyAssumed: true }];
    expect(row({ ...same, results, contents }, 'Gold: uncertainty')).toMatchObject({ differs: false });
  });

  it('names what stands on one side only', () => {
    const contents = [content, { ...content, ...silver, isPaidFor: true }];
    expect(row({ ...same, contents }, 'Silver: fineness')).toMatchObject({
      onReport: '–',
      differs: true,
      note: 'Not on the report, although it is paid for.',
    });
    expect(row({ ...same, results: [gold, silver] }, 'Silver: fineness')).toMatchObject({
      onLot: '–',
      note: 'On the report, left out of the lot.',
    });
  });
});

describe('claims beyond the report', () => {
  it('are what is paid for and higher, or not on the report at all', () => {
    const higher = { ...content, finenessPermille: '995.200000000001' };
    const unknown = { ...content, element: 'Pt', isPaidFor: true };
    const unpaid = { ...content, element: 'Cu', isPaidFor: false };
    expect(claimsBeyondReport({ results: [gold], contents: [content, unpaid] })).toEqual([]);
    expect(claimsBeyondReport({ results: [gold], contents: [higher, unknown] })).toEqual(['Au', 'Pt']);
  });
});
