import { beforeAll, describe, expect, it } from 'vitest';
import { lotAnswer, registerAnswer, type RegisterAnswer } from '#shared/schemas/lots.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { newId } from '#server/database/ids.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { QuotePoll } from '#server/models/quote-poll.ts';
import { Lot } from '#server/models/lot.ts';
import { Quote } from '#server/models/quote.ts';
import { buildLot, buildRates, type BuiltLot } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const ounce = { gross: '31.103477', permille: '999.9' };
const linked = (percent: string) => ({ pricing: 'linked', price: '', linkedPercent: percent });

type Name = 'gold96' | 'silver97' | 'linked9650' | 'linked98' | 'silverLinked';
let lots: Record<Name, BuiltLot>;
let passerBy: Visitor;
let asSeller: Visitor;

beforeAll(async () => {
  await buildRates();
  passerBy = await app.visitor();
  const seller = await buildMember({ canSell: true });
  lots = {
    gold96: await buildLot({ ...ounce, price: '4014.70' }),
    silver97: await buildLot({ ...ounce, metal: 'Ag', gross: '311.034768', price: '495.86' }),
    linked9650: await buildLot({ ...ounce, draft: linked('96.50') }),
    linked98: await buildLot({ sellerId: seller.id, ...ounce, draft: linked('98.2') }),
    silverLinked: await buildLot({ ...ounce, metal: 'Ag', gross: '311.034768', draft: linked('96.5') }),
  };
  asSeller = await app.signIn(seller);
});

async function list(query: string): Promise<RegisterAnswer> {
  const { body } = await passerBy.get(`/api/v1/lots?${query}`).expect(200);
  return registerAnswer.parse(body);
}
const nameOf = (code: string) => Object.entries(lots).find(([, lot]) => lot.code === code)?.[0] ?? code;
const named = (answer: RegisterAnswer) => answer.rows.map(({ code }) => nameOf(code));
const page = async (lot: BuiltLot, visitor = passerBy) =>
  lotAnswer.parse((await visitor.get(`/api/v1/lots/${lot.code}`).expect(200)).body);

async function setGold(usdPerTroyOunce: string): Promise<void> {
  const at = new Date();
  const source = `test-${newId()}`;
  await Quote.create({ id: newId(), metal: 'Au', usdPerTroyOunce, source, quotedAt: at, acceptedAt: at });
}

describe('a linked lot in the register', () => {
  it('stands among the sums by its percentage, page after page, whatever the metal', async () => {
    const whole = ['gold96', 'linked9650', 'silverLinked', 'silver97', 'linked98'];
    const tied = named(await list('sort=percent-of-melt'));
    expect([tied[0], ...tied.slice(1, 3).sort(), ...tied.slice(3)]).toEqual(whole);
    const seen: string[] = [];
    for (let cursor: string | null = ''; cursor !== null;) {
      const at: RegisterAnswer = await list(`sort=percent-of-melt&limit=1${cursor && `&cursor=${cursor}`}`);
      seen.push(...named(at));
      cursor = at.nextCursor;
    }
    expect(seen).toEqual(tied);
  });

  it('is filtered by its percentage and by its metal', async () => {
    expect(named(await list('sort=percent-of-melt&percentMin=96.5&percentMax=96.5')).sort()).toEqual([
      'linked9650',
      'silverLinked',
    ]);
    expect(named(await list('sort=percent-of-melt&percentMin=96.51&percentMax=98.2'))).toEqual([
      'silver97',
      'linked98',
    ]);
    expect(named(await list('sort=percent-of-melt&metal=Au'))).toEqual(['gold96', 'linked9650', 'linked98']);
    expect((await list('sort=newest&percentMax=96.2')).count).toBe(1);
  });

  it('shows its percentage and what that comes to at the newest quote', async () => {
    const row = (await list('sort=newest')).rows.find(({ code }) => code === lots.linked98.code);
    // 0.999900 oz t × 4182.40 = 4181.98; 98.20 % of it is 4106.70436
    expect(row).toMatchObject({
      linkedPercent: '98.20',
      percentOfMelt: '98.20',
      melt: { value: '4181.98' },
      price: { amount: '4106.70' },
      priceWait: null,
    });
  });
});

describe('a linked lot', () => {
  it('moves its sheet with the quote, and not one column of its row', async () => {
    const before = await Lot.findByPk(lots.linked98.id, { rejectOnEmpty: true });
    expect(before).toMatchObject({ pricingBasis: 'linked', priceMinor: null, linkedPercent: '98.2000' });
    expect(before.rankPrice).toBeNull();
    await setGold('4200.00');
    const lot = await page(lots.linked98);
    // 0.9999 × 4200.00 = 4199.58; 98.20 % of it is 4123.98756
    expect(lot).toMatchObject({
      pricingBasis: 'linked',
      linkedPercent: '98.20',
      price: { amount: '4123.99' },
      sheet: { price: '4123.99', percentOfMelt: '98.20' },
      priceWait: null,
    });
    expect(lot.sheet?.lines.map(({ label }) => label)).toContain('Price, 98.20 % of melt');
    expect((await Lot.findByPk(lots.linked98.id, { rejectOnEmpty: true })).get()).toEqual(before.get());
  });

  it('changes its percentage, never into a sum', async () => {
    const path = `/api/v1/lots/${lots.linked98.code}/price`;
    const { body } = await asSeller.post(path, { linkedPercent: '98.75' }).expect(200);
    expect(body).toMatchObject({ linkedPercent: '98.75' });
    expect(body.history.at(-1)).toMatchObject({ act: 'price-changed', note: 'linked 98.20 % → 98.75 %' });
    const sum = await asSeller.post(path, { price: '4000.00' }).expect(422);
    expect(sum.body.errors).toMatchObject([{ pointer: '/price', code: 'pricing-differs' }]);
    const wrong = await asSeller.post(path, { linkedPercent: '98.755' }).expect(422);
    expect(wrong.body.errors).toMatchObject([{ pointer: '/linkedPercent', code: 'too-many-decimals' }]);
    await asSeller.post(path, {}).expect(422);
    await asSeller.post(path, { price: '4000.00', linkedPercent: '98.00' }).expect(422);
  });

  it('says that its price waits, and until when, while the market is closed', async () => {
    const polledAt = new Date();
    const marketUntil = new Date(polledAt.getTime() + 3_600_000);
    const closed = { outcome: 'accepted', marketOpen: false, marketUntil, detail: {} } as const;
    await QuotePoll.create({ id: newId(), polledAt, ...closed });
    const wait = { reason: 'closed', until: marketUntil.toISOString() };
    expect((await page(lots.linked98)).priceWait).toEqual(wait);
    const answer = await list('sort=percent-of-melt');
    expect(answer.rows.find(({ code }) => code === lots.linked98.code)?.priceWait).toEqual(wait);
    expect(answer.rows.find(({ code }) => code === lots.gold96.code)?.priceWait).toBeNull();
    await QuotePoll.destroy({ where: {} });
  });

  it('waits for a fresh quote of its own metals alone', async () => {
    const old = new Date(Date.now() - 301_000);
    await Quote.update({ quotedAt: old }, { where: { metal: 'Ag' } });
    expect((await page(lots.silverLinked)).priceWait).toEqual({ reason: 'stale', until: null });
    expect((await page(lots.linked98)).priceWait).toBeNull();
    const reading = { metal: 'Ag', mid: '51.125', bid: null, ask: null, at: new Date() } as const;
    await withTransaction({}, (unit) => storeReading(reading, 'test', true, unit));
    expect((await page(lots.silverLinked)).priceWait).toBeNull();
  });
});
