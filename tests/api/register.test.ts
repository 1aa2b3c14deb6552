import { QueryTypes } from 'sequelize';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Metal } from '#shared/metals.ts';
import { registerAnswer, type RegisterAnswer } from '#shared/schemas/lots.ts';
import { sequelize } from '#server/database/connection.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { Lot } from '#server/models/lot.ts';
import { Quote } from '#server/models/quote.ts';
import { buildLot, buildRates, LOT_RATES, type BuiltLot } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp, type TestApp, type Visitor } from '#tests/helpers/test-app.ts';

let app: TestApp;
let passerBy: Visitor;
let asSeller: Visitor;
/** By name: what each test speaks of. */
let lots: Record<'gold98' | 'gold95' | 'gold101' | 'silver96' | 'silver90' | 'mixed', BuiltLot>;

async function setQuote(metal: Metal, usdPerTroyOunce: string): Promise<void> {
  const at = new Date();
  await Quote.create({
    id: newId(),
    metal,
    usdPerTroyOunce,
    source: `test-${newId()}`,
    quotedAt: at,
    acceptedAt: at,
  });
}

/** 31.1034768 g of pure metal are one troy ounce, so a price is its percentage of the rate. */
const ounce = { gross: '31.103477', permille: '999.9' };

beforeAll(async () => {
  app = await startTestApp();
  await buildRates();
  passerBy = await app.visitor();
  const seller = await buildMember({ canSell: true });
  asSeller = await app.signIn(seller);
  const sellerId = seller.id;
  const permille = (value: string) => ({ value, unit: 'permille' });
  const part = (metal: string, value: string) => ({
    metal,
    fineness: permille(value),
    uncertainty: permille('0.5'),
    method: 'fire_assay',
    paidFor: true,
  });
  lots = {
    gold98: await buildLot({ sellerId, ...ounce, price: '4098.75' }),
    gold95: await buildLot({ ...ounce, price: '3973.28', draft: { form: 'bar', destinations: ['NO'] } }),
    gold101: await buildLot({ ...ounce, price: '4224.22' }),
    silver96: await buildLot({ ...ounce, metal: 'Ag', price: '49.08', draft: { form: 'grain' } }),
    silver90: await buildLot({ ...ounce, metal: 'Ag', gross: '311.034768', price: '460.13' }),
    mixed: await buildLot({
      price: '2500.00',
      draft: { contents: [part('Au', '600'), part('Ag', '300')] },
    }),
  };
});

async function list(query: string, visitor = passerBy): Promise<RegisterAnswer> {
  const { body } = await visitor.get(`/api/v1/lots?${query}`).expect(200);
  return registerAnswer.parse(body);
}
const codes = (answer: RegisterAnswer) => answer.rows.map(({ code }) => code);
const named = (answer: RegisterAnswer) =>
  codes(answer).map((code) => Object.entries(lots).find(([, lot]) => lot.code === code)?.[0] ?? code);

async function walk(query: string, between: () => Promise<void> = async () => undefined): Promise<string[]> {
  const seen: string[] = [];
  let cursor: string | null = null;
  do {
    const page = await list(cursor === null ? query : `${query}&cursor=${cursor}`);
    seen.push(...named(page));
    cursor = page.nextCursor;
    await between();
  } while (cursor !== null && seen.length < 100);
  return seen;
}

const BY_PERCENT = ['silver90', 'gold95', 'silver96', 'gold98', 'mixed', 'gold101'];

describe('the register', () => {
  it('shows open lots with figures at the newest quotes, and no address', async () => {
    const answer = await list('sort=percent-of-melt');
    expect(answer).toMatchObject({ count: 6, isCountCapped: false, quoteState: 'fresh', nextCursor: null });
    const row = answer.rows.find(({ code }) => code === lots.gold98.code);
    expect(row).toMatchObject({
      mainMetal: 'Au',
      form: 'button',
      evidenceGrade: 'certified',
      settlesOn: 'stated',
      gross: { value: '31.103477', unit: 'g', grams: '31.103477' },
      fineGrams: '31.100367',
      fineTroyOunces: '0.999900',
      price: { amount: '4098.75' },
      // 0.999900 oz t × 4182.40
      melt: { value: '4181.98' },
      percentOfMelt: '98.01',
      isMine: false,
    });
    expect(row?.melt?.lowPercent).toMatch(/^99\.9\d$/);
    const own = await list('sort=percent-of-melt', asSeller);
    expect(own.rows.filter(({ isMine }) => isMine).map(({ code }) => code)).toEqual([lots.gold98.code]);
  });

  it('may be kept by anyone for seconds, and a signed-in page by nobody', async () => {
    const open = await passerBy.get('/api/v1/lots').expect(200);
    expect(open.headers['cache-control']).toContain('max-age=5');
    expect((await asSeller.get('/api/v1/lots')).headers['cache-control']).toBe('private, no-store');
  });

  it('leaves out what is not open', async () => {
    const closed = await buildLot({ state: 'paused' });
    expect(codes(await list('limit=50'))).not.toContain(closed.code);
  });
});

describe('sorts', () => {
  it('puts the newest first', async () => {
    const opened = Object.keys(lots).reverse();
    expect(named(await list(''))).toEqual(opened);
    expect(await walk('limit=2')).toEqual(opened);
  });

  it('puts the least % of melt first, across metals', async () => {
    expect(named(await list('sort=percent-of-melt'))).toEqual(BY_PERCENT);
    expect(await walk('sort=percent-of-melt&limit=1')).toEqual(BY_PERCENT);
  });

  it('puts the most fine content first', async () => {
    const grams = (await list('sort=fine-content')).rows.map(({ fineGrams }) => fineGrams);
    expect(grams[0]).toBe('311.003665');
    expect(await walk('sort=fine-content&limit=2')).toEqual(named(await list('sort=fine-content')));
  });
});

describe('filters', () => {
  it.each([
    ['metal=Ag', ['silver96', 'silver90']],
    ['form=bar', ['gold95']],
    ['grade=certified&form=grain', ['silver96']],
    ['grade=declared', []],
    ['destination=NO', ['gold95']],
    ['destination=CA&metal=Ag', ['silver96', 'silver90']],
    ['finenessMax=600', ['mixed']],
    ['finenessMin=600&finenessMax=600', ['mixed']],
    ['finenessMin=600.1&metal=Au', ['gold98', 'gold95', 'gold101']],
    ['fineGramsMin=311', ['silver90']],
    ['fineGramsMax=18.72', ['mixed']],
    ['percentMax=95.5', ['silver90', 'gold95']],
    ['percentMin=96&percentMax=98.5', ['silver96', 'gold98']],
    ['percentMin=98.6&metal=Au', ['mixed', 'gold101']],
    ['metal=Pt', []],
  ])('%s', async (query, expected) => {
    const answer = await list(`sort=percent-of-melt&${query}`);
    expect(named(answer).sort()).toEqual([...expected].sort());
    expect(answer.count).toBe(expected.length);
    const walked = await walk(`limit=1&sort=newest&${query}`);
    expect(walked.sort()).toEqual([...expected].sort());
  });

  it.each([
    ['percentMin=9,5', '/percentMin'],
    ['finenessMin=abc', '/finenessMin'],
    ['destination=usa', '/destination'],
    ['metal=Cu', '/metal'],
    ['sort=price', '/sort'],
    ['limit=0', '/limit'],
    ['limit=51', '/limit'],
    ['cursor=nonsense', '/cursor'],
    ["cursor=' OR 1=1", '/cursor'],
  ])('refuses %s at its field', async (query, pointer) => {
    const { body } = await passerBy.get(`/api/v1/lots?${query}`).expect(422);
    expect(body.errors).toMatchObject([{ pointer }]);
  });

  it('refuses a cursor of another sort', async () => {
    const { nextCursor } = await list('limit=1');
    await passerBy.get(`/api/v1/lots?sort=fine-content&cursor=${nextCursor}`).expect(422);
  });
});

async function checksum(): Promise<unknown> {
  const rows = await sequelize.query(
    `SELECT COUNT(*) AS lots, SUM(CRC32(CONCAT_WS('|', id, state, lock_version, updated_at, main_metal, rank_price,
     main_fine_grams))) AS sum FROM lots`,
    { type: QueryTypes.SELECT },
  );
  return rows[0];
}

describe('when the quote moves', () => {
  it('writes no lot row', async () => {
    const before = await checksum();
    const reading = { metal: 'Au' as const, mid: '4190.00', bid: null, ask: null, at: new Date() };
    const verdict = await withTransaction({}, (unit) => storeReading(reading, 'test', true, unit));
    expect(verdict.kind).toBe('accept');
    expect((await list('sort=percent-of-melt')).rows.map(({ percentOfMelt }) => percentOfMelt)).toContain(
      '97.83',
    );
    expect(await checksum()).toEqual(before);
    await setQuote('Au', LOT_RATES.Au);
  });

  it('finishes a listing in the order that it began with, and begins the next anew', async () => {
    let moved = false;
    const walked = await walk('sort=percent-of-melt&limit=2', async () => {
      if (moved) return;
      moved = true;
      await setQuote('Au', '4391.52');
    });
    expect(walked).toEqual(BY_PERCENT);
    const anew = ['silver90', 'gold95', 'gold98', 'mixed', 'silver96', 'gold101'];
    expect(await walk('sort=percent-of-melt&limit=2')).toEqual(anew);
    await setQuote('Au', LOT_RATES.Au);
  });

  it('filters a listing at the quotes that it began with', async () => {
    const first = await list('sort=newest&limit=1&percentMax=96.5');
    await setQuote('Au', '3500.00');
    const rest = await list(`sort=newest&limit=50&percentMax=96.5&cursor=${first.nextCursor}`);
    expect([...named(first), ...named(rest)]).toEqual(['silver90', 'silver96', 'gold95']);
    await setQuote('Au', LOT_RATES.Au);
  });

  it('shows a lot without a quote at the end and without a percentage', async () => {
    await sequelize.query("DELETE FROM day_rates WHERE metal = 'Ag'");
    await Quote.destroy({ where: { metal: 'Ag' } });
    const answer = await list('sort=percent-of-melt');
    const names = named(answer);
    expect(names.slice(0, 4)).toEqual(['gold95', 'gold98', 'mixed', 'gold101']);
    expect(names.slice(4).sort()).toEqual(['silver90', 'silver96']);
    expect(answer.rows.at(-1)).toMatchObject({ percentOfMelt: null, melt: null });
    expect(await walk('sort=percent-of-melt&limit=1')).toEqual(names);
    await setQuote('Ag', LOT_RATES.Ag);
  });
});

describe('a lot that leaves while the list is read', () => {
  it('is missed by no other', async () => {
    const first = await list('sort=percent-of-melt&limit=2');
    await Lot.update({ state: 'reserved' }, { where: { id: lots.gold95.id } });
    const rest = await list(`sort=percent-of-melt&cursor=${first.nextCursor}`);
    expect([...named(first), ...named(rest)]).toEqual(BY_PERCENT);
    await Lot.update({ state: 'open' }, { where: { id: lots.gold95.id } });
  });
});
