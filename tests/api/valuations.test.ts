import { beforeAll, describe, expect, it } from 'vitest';
import { valuationAnswer } from '#shared/schemas/valuations.ts';
import { databaseNow, pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { startTestApp, type TestApp } from '#tests/helpers/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});

const EXAMPLE = {
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
const content = (change: object) => ({ ...EXAMPLE, contents: [{ ...EXAMPLE.contents[0], ...change }] });

/** Without a cookie, a token or a page. */
async function post(body: unknown): Promise<{ status: number; type: string; body: Record<string, unknown> }> {
  const answer = await fetch(`${app.url}/api/v1/valuations`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: typeof body === 'string' ? body : JSON.stringify(body),
  });
  const type = answer.headers.get('content-type') ?? '';
  return { status: answer.status, type, body: (await answer.json()) as Record<string, unknown> };
}

describe('a valuation', () => {
  it('answers the worked example to the cent, without session or token', async () => {
    const { status, body } = await post(EXAMPLE);
    expect(status).toBe(200);
    expect(valuationAnswer.parse(body)).toEqual({
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

  it('labels what it had to assume', async () => {
    const { mass, quotes } = EXAMPLE;
    const contents = [{ metal: 'Au', fineness: { value: '22', unit: 'karat' } }];
    const { body } = await post({ mass, contents, quotes });
    expect(valuationAnswer.parse(body).assumed.map(({ field }) => field)).toEqual([
      '/readability',
      '/contents/0/uncertainty',
    ]);
  });

  it.each(['g', 'kg', 'mg', 'ozt', 'dwt', 'gr', 'lb', 'oz'])('takes a mass in %s', async (unit) => {
    const { status } = await post({ ...EXAMPLE, mass: { value: '1.5', unit }, readability: null });
    expect(status).toBe(200);
  });

  it.each([
    ['916.7', 'permille'],
    ['22', 'karat'],
    ['91.67', 'percent'],
    ['916700', 'gpt'],
  ])('takes a fineness of %s %s', async (value, unit) => {
    expect((await post(content({ fineness: { value, unit } }))).status).toBe(200);
  });
});

const REFUSED: [string, unknown, string, string][] = [
  ['mass zero', { ...EXAMPLE, mass: { value: '0', unit: 'g' } }, '/mass/value', 'too-small'],
  ['a negative mass', { ...EXAMPLE, mass: { value: '-1', unit: 'g' } }, '/mass/value', 'too-small'],
  ['mass 1e9', { ...EXAMPLE, mass: { value: '1e9', unit: 'g' } }, '/mass/value', 'not-a-decimal'],
  [
    'a thousand tonnes',
    { ...EXAMPLE, mass: { value: '1000000000', unit: 'g' } },
    '/mass/value',
    'mass-too-large',
  ],
  [
    '15 decimals',
    { ...EXAMPLE, mass: { value: '1.123456789012345', unit: 'g' } },
    '/mass/value',
    'too-many-decimals',
  ],
  ['a comma', { ...EXAMPLE, mass: { value: '12,34', unit: 'g' } }, '/mass/value', 'decimal-comma'],
  ['a missing unit', { ...EXAMPLE, mass: { value: '12.34' } }, '/mass/unit', 'unit-missing'],
  ['an unknown unit', { ...EXAMPLE, mass: { value: '12.34', unit: 'tola' } }, '/mass/unit', 'unit-unknown'],
  [
    'a mass as a JSON number',
    { ...EXAMPLE, mass: { value: 12.34, unit: 'g' } },
    '/mass/value',
    'invalid_type',
  ],
  ['no mass', { contents: EXAMPLE.contents, quotes: EXAMPLE.quotes }, '/mass/unit', 'unit-missing'],
  [
    'fineness 0',
    content({ fineness: { value: '0', unit: 'permille' } }),
    '/contents/0/fineness/value',
    'fineness-too-low',
  ],
  [
    'fineness 1000.1',
    content({ fineness: { value: '1000.1', unit: 'permille' } }),
    '/contents/0/fineness/value',
    'fineness-too-high',
  ],
  [
    'karat 25',
    content({ fineness: { value: '25', unit: 'karat' } }),
    '/contents/0/fineness/value',
    'fineness-too-high',
  ],
  [
    'a fineness with comma',
    content({ fineness: { value: '916,7', unit: 'permille' } }),
    '/contents/0/fineness/value',
    'decimal-comma',
  ],
  ['an unknown metal', content({ metal: 'Xx' }), '/contents/0/metal', 'metal-unknown'],
  ['copper', content({ metal: 'Cu' }), '/contents/0/paidFor', 'not-payable'],
  ['no contents', { ...EXAMPLE, contents: [] }, '/contents', 'contents-missing'],
  ['a quote of zero', { ...EXAMPLE, quotes: { Au: '0' } }, '/quotes/Au', 'too-small'],
  ['a quote with comma', { ...EXAMPLE, quotes: { Au: '2000,00' } }, '/quotes/Au', 'decimal-comma'],
  ['an unknown field', { ...EXAMPLE, price: '1' }, '', 'unrecognized_keys'],
];

describe('bad input', () => {
  it.each(REFUSED)('refuses %s at its field', async (_, request, pointer, code) => {
    const { status, type, body } = await post(request);
    expect(status).toBe(422);
    expect(type).toContain('application/problem+json');
    expect(body).toMatchObject({ code: 'invalid-input', status: 422 });
    expect(body['errors']).toContainEqual(expect.objectContaining({ pointer, code }));
  });

  it('refuses fractions over 1000 in total', async () => {
    const silver = { metal: 'Ag', fineness: { value: '90', unit: 'permille' } };
    const { body } = await post({
      ...EXAMPLE,
      contents: [...EXAMPLE.contents, silver],
      quotes: { Au: '2000.00', Ag: '25.00' },
    });
    expect(body['errors']).toMatchObject([{ pointer: '/contents', code: 'fractions-over-whole' }]);
  });

  it('tells several at once', async () => {
    const { body } = await post({
      ...content({ fineness: { value: '25', unit: 'karat' } }),
      mass: { value: '0' },
    });
    const pointers = (body['errors'] as { pointer: string }[]).map(({ pointer }) => pointer);
    expect(pointers).toEqual(['/mass/unit', '/contents/0/fineness/value']);
  });

  it('refuses a body that is no JSON, and one that is no object', async () => {
    expect((await post('{')).status).toBe(400);
    expect((await post('[]')).status).toBe(422);
  });
});

const fieldsAssumed = (body: unknown) => valuationAnswer.parse(body).assumed.map(({ field }) => field);

describe('without quotes given', () => {
  it('says that there is no quote, then values at the newest accepted one and names it', async () => {
    const { mass, contents } = EXAMPLE;
    const before = await post({ mass, contents });
    expect(before.status).toBe(409);
    expect(before.body).toMatchObject({ code: 'no-fresh-quote', errors: [{ code: 'quote-missing' }] });
    const at = await databaseNow();
    const reading = { metal: 'Au' as const, mid: '4182.40', bid: null, ask: null, at };
    await withTransaction({}, (unit) => storeReading(reading, 'test', true, unit));
    const { body } = await post({ mass, contents });
    expect(valuationAnswer.parse(body).metals[0]).toMatchObject({
      value: '1521.11',
      quote: { usdPerTroyOunce: '4182.4', at: at.toISOString(), source: 'test' },
    });
    expect(fieldsAssumed(body)).not.toContain('/quotes/Au');
    pinDatabaseTime(new Date(at.getTime() + 301_000));
    const later = await post({ mass, contents });
    pinDatabaseTime(null);
    expect(later.status).toBe(200);
    expect(fieldsAssumed(later.body)).toContain('/quotes/Au');
  });
});
