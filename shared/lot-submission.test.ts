import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkLotDraft, draftSheetInput } from './lot-submission.ts';
import { lotDraft, type LotDraft } from './schemas/lots.ts';
import { refinedSheet } from './settlement/refined-sheet.ts';
import type { QuoteRef } from './settlement/sheet-types.ts';

const NOW = new Date('2026-12-01T12:00:00.000Z');
const GOLD_QUOTE: QuoteRef = { id: null, metal: 'Au', usdPerTroyOunce: '2000.00', at: null, source: 'test' };

const COMPLETE: LotDraft = lotDraft.parse({
  form: 'button',
  title: 'Gold button, cupelled',
  gross: { value: '12.34', unit: 'g' },
  readability: { value: '0.01', unit: 'g' },
  contents: [
    {
      metal: 'Au',
      fineness: { value: '916.7', unit: 'permille' },
      uncertainty: { value: '0.5', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
    { metal: 'Cu', fineness: { value: '80', unit: 'permille' }, method: 'xrf' },
  ],
  price: '700.00',
  shipping: '18.50',
  destinations: ['US', 'CA'],
  closesOn: '2027-01-15',
  certificate: {
    fileId: '0193a1f0-0000-7000-8000-000000000001',
    fileName: 'report.pdf',
    laboratoryName: 'Tarn Assay House',
    number: 'TA-2026-118',
    issuedOn: '2026-11-20',
    sampling: 'laboratory',
    itemMass: { value: '12.34', unit: 'g' },
    results: [{ element: 'Au', fineness: { value: '916.7', unit: 'permille' }, method: 'fire_assay' }],
  },
  confirmsCautions: true,
  confirmsTitle: true,
});

type Change = (draft: LotDraft) => void;

function changed(change: Change): LotDraft {
  const draft = structuredClone(COMPLETE);
  change(draft);
  return draft;
}

function problemsOf(draft: LotDraft): string[] {
  return checkLotDraft(draft, NOW).problems.map(({ code, pointer }) => `${code} at ${pointer}`);
}

const gold = (draft: LotDraft) => draft.contents[0]!;
const result = (draft: LotDraft) => draft.certificate.results[0]!;

describe('a complete draft', () => {
  it('is read with the digits typed', () => {
    const { problems, value } = checkLotDraft(COMPLETE, NOW);
    expect(problems).toEqual([]);
    expect(value).toMatchObject({
      form: 'button',
      gross: { value: '12.34', unit: 'g' },
      readability: { value: '0.01', unit: 'g' },
      priceMinor: 70_000n,
      shippingMinor: 1_850n,
      destinations: ['US', 'CA'],
      closesOn: '2027-01-15',
      certificate: { number: 'TA-2026-118', itemMark: null, itemMass: { value: '12.34', unit: 'g' } },
    });
    expect(value?.contents).toHaveLength(2);
  });

  it('may leave out readability, uncertainty, method and closing day', () => {
    const draft = changed((it) => {
      it.readability = { value: '', unit: '' };
      gold(it).uncertainty = { value: '', unit: '' };
      gold(it).method = '';
      it.closesOn = '';
    });
    expect(checkLotDraft(draft, NOW).value).toMatchObject({
      readability: null,
      closesOn: null,
      contents: [{ uncertainty: null, method: 'none' }, {}],
    });
  });

  it.each([
    ['12,34', '12.34'],
    ['1 234.5', '1234.5'],
    ['1,234.50', '1234.50'],
    ['0,125', '0.125'],
    ['12.50', '12.50'],
  ])('reads a mass typed as %s', (typed, read) => {
    const draft = changed((it) => (it.gross.value = typed));
    expect(checkLotDraft(draft, NOW).value?.gross).toEqual({ value: read, unit: 'g' });
  });

  it.each([
    ['1,234.50', 123_450n],
    ['20', 2_000n],
    ['700,5', 70_050n],
    ['990000.00', 99_000_000n],
  ])('reads a price typed as %s', (typed, minor) => {
    expect(
      checkLotDraft(
        changed((it) => (it.price = typed)),
        NOW,
      ).value?.priceMinor,
    ).toBe(minor);
  });
});

const REFUSED: [string, Change, string[]][] = [
  ['no form', (it) => (it.form = ''), ['form-missing at /form']],
  ['a scrap form', (it) => (it.form = 'karat_scrap'), ['form-missing at /form']],
  ['a title of four letters', (it) => (it.title = ' Gold '), ['title-too-short at /title']],
  ['no mass', (it) => (it.gross.value = ''), ['number-missing at /gross/value']],
  ['mass zero', (it) => (it.gross.value = '0'), ['too-small at /gross/value']],
  ['a negative mass', (it) => (it.gross.value = '-12.34'), ['too-small at /gross/value']],
  ['mass 1e9', (it) => (it.gross.value = '1e9'), ['not-a-decimal at /gross/value']],
  ['a mass of 1000000000 g', (it) => (it.gross.value = '1000000000'), ['mass-too-large at /gross/value']],
  ['15 decimals', (it) => (it.gross.value = '1.123456789012345'), ['too-many-decimals at /gross/value']],
  ['an ambiguous comma', (it) => (it.gross.value = '1,234'), ['number-ambiguous at /gross/value']],
  ['a mass without unit', (it) => (it.gross.unit = ''), ['unit-missing at /gross/unit']],
  ['an unknown unit', (it) => (it.gross.unit = 'tola'), ['unit-unknown at /gross/unit']],
  ['readability zero', (it) => (it.readability.value = '0'), ['too-small at /readability/value']],
  [
    'too coarse a balance',
    (it) => (it.readability.value = '20'),
    ['readability-too-large at /readability/value'],
  ],
  [
    'no contents',
    (it) => {
      it.contents = [];
    },
    ['contents-missing at /contents'],
  ],
  ['nothing paid for', (it) => (gold(it).paidFor = false), ['nothing-paid-for at /contents']],
  ['copper paid for', (it) => (it.contents[1]!.paidFor = true), ['not-payable at /contents/1/paidFor']],
  ['fineness 0', (it) => (gold(it).fineness.value = '0'), ['fineness-too-low at /contents/0/fineness/value']],
  [
    'fineness below 0',
    (it) => (gold(it).fineness.value = '-3'),
    ['fineness-too-low at /contents/0/fineness/value'],
  ],
  [
    'fineness 1000.1',
    (it) => (gold(it).fineness.value = '1000.1'),
    ['fineness-too-high at /contents/0/fineness/value'],
  ],
  [
    'karat 25',
    (it) => (gold(it).fineness = { value: '25', unit: 'karat' }),
    ['fineness-too-high at /contents/0/fineness/value'],
  ],
  [
    'a fineness without unit',
    (it) => (gold(it).fineness.unit = ''),
    ['unit-missing at /contents/0/fineness/unit'],
  ],
  [
    'a fineness as a fraction',
    (it) => (gold(it).fineness.value = '3/4'),
    ['not-a-decimal at /contents/0/fineness/value'],
  ],
  [
    'fractions over the whole',
    (it) => (it.contents[1]!.fineness.value = '90'),
    ['fractions-over-whole at /contents'],
  ],
  ['a metal twice', (it) => (it.contents[1]!.metal = 'Au'), ['metal-repeated at /contents/1/metal']],
  ['an unknown metal', (it) => (it.contents[1]!.metal = 'Xx'), ['metal-unknown at /contents/1/metal']],
  ['an unknown method', (it) => (gold(it).method = 'guess'), ['method-unknown at /contents/0/method']],
  [
    'uncertainty 0',
    (it) => (gold(it).uncertainty.value = '0'),
    ['fineness-too-low at /contents/0/uncertainty/value'],
  ],
  ['no price', (it) => (it.price = ''), ['number-missing at /price']],
  ['a price of 19.99', (it) => (it.price = '19.99'), ['price-too-low at /price']],
  ['a price below zero', (it) => (it.price = '-700'), ['price-too-low at /price']],
  ['a price over the limit', (it) => (it.price = '990000.01'), ['price-too-high at /price']],
  ['a parcel over the limit', (it) => (it.shipping = '10000.00'), ['too-large at /shipping']],
  ['a price with 3 decimals', (it) => (it.price = '700.123'), ['too-many-decimals at /price']],
  ['an ambiguous price', (it) => (it.price = '1,234'), ['number-ambiguous at /price']],
  ['a price in words', (it) => (it.price = 'a lot'), ['not-a-decimal at /price']],
  ['no parcel charge', (it) => (it.shipping = ''), ['number-missing at /shipping']],
  ['a parcel charge below zero', (it) => (it.shipping = '-1'), ['amount-negative at /shipping']],
  [
    'no destination',
    (it) => {
      it.destinations = [];
    },
    ['destinations-missing at /destinations'],
  ],
  [
    'a destination in small letters',
    (it) => {
      it.destinations = ['us'];
    },
    ['country-unknown at /destinations/0'],
  ],
  [
    'a destination that no country has',
    (it) => {
      it.destinations = ['US', 'ZZ'];
    },
    ['country-unknown at /destinations/1'],
  ],
  [
    'a destination twice',
    (it) => {
      it.destinations = ['US', 'US'];
    },
    ['country-repeated at /destinations/1'],
  ],
  ['a closing day that does not exist', (it) => (it.closesOn = '2027-02-29'), ['date-invalid at /closesOn']],
  ['closing today', (it) => (it.closesOn = '2026-12-01'), ['date-too-early at /closesOn']],
  ['closing in 91 days', (it) => (it.closesOn = '2027-03-02'), ['date-too-late at /closesOn']],
  ['no certificate file', (it) => (it.certificate.fileId = null), ['file-missing at /certificate/fileId']],
  [
    'no laboratory',
    (it) => (it.certificate.laboratoryName = ' '),
    ['laboratory-missing at /certificate/laboratoryName'],
  ],
  ['no report number', (it) => (it.certificate.number = ''), ['number-missing at /certificate/number']],
  ['no date of issue', (it) => (it.certificate.issuedOn = ''), ['date-missing at /certificate/issuedOn']],
  [
    'a report of tomorrow',
    (it) => (it.certificate.issuedOn = '2026-12-02'),
    ['date-in-future at /certificate/issuedOn'],
  ],
  [
    'a test date that is none',
    (it) => (it.certificate.testedOn = 'May'),
    ['date-invalid at /certificate/testedOn'],
  ],
  [
    'nobody who sampled',
    (it) => (it.certificate.sampling = ''),
    ['sampling-missing at /certificate/sampling'],
  ],
  [
    'neither mass nor mark',
    (it) => (it.certificate.itemMass.value = ''),
    ['item-not-identified at /certificate/itemMass/value'],
  ],
  [
    'a report mass of zero',
    (it) => (it.certificate.itemMass.value = '0'),
    ['too-small at /certificate/itemMass/value'],
  ],
  [
    'no results',
    (it) => {
      it.certificate.results = [];
    },
    ['results-missing at /certificate/results'],
  ],
  [
    'no result for a metal paid for',
    (it) => (result(it).element = 'Ag'),
    ['result-missing at /certificate/results'],
  ],
  [
    'a result of 1000.1',
    (it) => (result(it).fineness.value = '1000.1'),
    ['fineness-too-high at /certificate/results/0/fineness/value'],
  ],
  [
    'a result twice',
    (it) =>
      it.certificate.results.push(
        structuredClone({ ...result(it), fineness: { value: '1', unit: 'permille' } }),
      ),
    ['metal-repeated at /certificate/results/1/element'],
  ],
  ['cautions not confirmed', (it) => (it.confirmsCautions = false), ['not-confirmed at /confirmsCautions']],
  ['title not confirmed', (it) => (it.confirmsTitle = false), ['not-confirmed at /confirmsTitle']],
];

describe('refusals', () => {
  it.each(REFUSED)('refuses %s at its field', (_, change, expected) => {
    const { problems, value } = checkLotDraft(changed(change), NOW);
    expect(problems.map(({ code, pointer }) => `${code} at ${pointer}`)).toEqual(expected);
    expect(value).toBeNull();
  });

  it('takes the last day allowed and the lowest price', () => {
    const draft = changed((it) => {
      it.closesOn = '2027-03-01';
      it.price = '20.00';
    });
    expect(problemsOf(draft)).toEqual([]);
  });

  it('takes a mark in place of a mass on the report', () => {
    const draft = changed((it) => {
      it.certificate.itemMass = { value: '', unit: '' };
      it.certificate.itemMark = 'TA 118';
    });
    expect(problemsOf(draft)).toEqual([]);
  });

  it('tells everything that an empty draft lacks at once', () => {
    expect(problemsOf(lotDraft.parse({}))).toEqual([
      'form-missing at /form',
      'title-too-short at /title',
      'number-missing at /gross/value',
      'unit-missing at /gross/unit',
      'contents-missing at /contents',
      'number-missing at /price',
      'number-missing at /shipping',
      'destinations-missing at /destinations',
      'file-missing at /certificate/fileId',
      'laboratory-missing at /certificate/laboratoryName',
      'number-missing at /certificate/number',
      'date-missing at /certificate/issuedOn',
      'sampling-missing at /certificate/sampling',
      'item-not-identified at /certificate/itemMass/value',
      'results-missing at /certificate/results',
      'not-confirmed at /confirmsCautions',
      'not-confirmed at /confirmsTitle',
    ]);
  });

  it('judges the rows that can be read beside one that cannot, and points at the right row', () => {
    const draft = changed((it) => {
      it.contents.unshift({ ...structuredClone(gold(it)), metal: '', paidFor: false });
      it.contents[1]!.fineness.value = '1000.1';
    });
    expect(problemsOf(draft)).toEqual([
      'metal-unknown at /contents/0/metal',
      'fineness-too-high at /contents/1/fineness/value',
    ]);
  });
});

describe('the live sheet of a draft', () => {
  it('is there as soon as mass, metal and quote are', () => {
    const draft = lotDraft.parse({ gross: COMPLETE.gross, contents: COMPLETE.contents });
    const input = draftSheetInput(draft, [GOLD_QUOTE]);
    expect(input).toMatchObject({ price: null, shipping: null, moment: 'estimated', audience: 'buyer' });
    expect(refinedSheet(input!).melt.value).toBe('727.38');
  });

  it('carries price and parcel once they can be read', () => {
    const sheet = refinedSheet(draftSheetInput(COMPLETE, [GOLD_QUOTE])!);
    expect(sheet).toMatchObject({ price: '700.00', shipping: '18.50', total: '718.50' });
  });

  it('shows the seller what goes to him', () => {
    const commission = { method: 'card', percent: '4', minimum: '2.00' };
    const sheet = refinedSheet(draftSheetInput(COMPLETE, [GOLD_QUOTE], { audience: 'seller', commission })!);
    expect(sheet.total).toBe('690.50');
  });

  it('is not there without a mass, a quote, or with a fineness that cannot be', () => {
    expect(draftSheetInput(lotDraft.parse({}), [GOLD_QUOTE])).toBeNull();
    expect(draftSheetInput(COMPLETE, [])).toBeNull();
    expect(
      draftSheetInput(
        changed((it) => (gold(it).fineness.value = '1001')),
        [GOLD_QUOTE],
      ),
    ).toBeNull();
  });

  it('leaves out a price that is still being typed', () => {
    const sheet = refinedSheet(
      draftSheetInput(
        changed((it) => (it.price = '7')),
        [GOLD_QUOTE],
      )!,
    );
    expect(sheet).toMatchObject({ price: null, total: null });
  });
});

describe('properties', () => {
  it('never throws, whatever is typed, and reads nothing while there is a problem', () => {
    const typed = fc.oneof(fc.string({ maxLength: 20 }), fc.constantFrom('12.5', '1,234', '-1', '0', '1e9'));
    fc.assert(
      fc.property(typed, typed, typed, typed, (value, unit, price, day) => {
        const draft = changed((it) => {
          it.gross = { value, unit };
          it.price = price;
          it.closesOn = day;
          gold(it).fineness = { value: price, unit: 'permille' };
        });
        const { problems, value: read } = checkLotDraft(draft, NOW);
        expect(read === null).toBe(problems.length > 0);
      }),
    );
  });
});
