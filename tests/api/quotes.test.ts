import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { pollQuotes } from '#jobs/poll-quotes.ts';
import { pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { newestQuotes } from '#server/features/quotes/quote-queries.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { AuditEntry, DayRate, Quote, QuoteCandidate, QuotePoll } from '#server/models/index.ts';
import { startQuotesFake } from '#tests/fakes/quotes/start-quotes-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const port = Number.parseInt(new URL(process.env.QUOTES_URL!).port, 10);
let fake: Awaited<ReturnType<typeof startQuotesFake>>;

beforeAll(async () => {
  fake = await startQuotesFake({ port });
});
afterAll(() => fake.close());
beforeEach(async () => {
  await DayRate.destroy({ where: {} });
  await Quote.destroy({ where: {} });
  await QuoteCandidate.destroy({ where: {} });
  await QuotePoll.destroy({ where: {} });
  await control('/control/scenario', { scenario: 'normal' });
});
afterEach(() => pinDatabaseTime(null));

async function control(path: string, body: object): Promise<void> {
  const answer = await fetch(`${fake.url}${path}`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify(body),
  });
  expect(answer.ok, `${path} ${JSON.stringify(body)}`).toBe(true);
}

describe('polling', () => {
  it('stores the four metals and shows them with time and source', async () => {
    expect(await pollQuotes()).toMatchObject({ outcome: 'accepted' });
    const answer = await (await app.visitor()).get('/api/v1/quotes').expect(200);
    expect(answer.body.state).toBe('fresh');
    expect(answer.body.quotes.map((quote: { metal: string }) => quote.metal)).toEqual([
      'Au',
      'Ag',
      'Pt',
      'Pd',
    ]);
    for (const quote of answer.body.quotes) {
      expect(quote).toMatchObject({ isFresh: true, isQuarantined: false, source: 'quote service' });
      expect(quote.usdPerTroyOunce).toMatch(/^\d+(\.\d+)?$/);
    }
  });

  it('stores the same reading once, however often it comes', async () => {
    const at = new Date(Date.now() - 5_000);
    const reading = { metal: 'Au' as const, mid: '4182.40', bid: null, ask: null, at };
    const store = () => withTransaction({}, (unit) => storeReading(reading, 'test', true, unit));
    expect((await store()).kind).toBe('accept');
    expect((await store()).kind).toBe('known');
    expect(await Quote.count({ where: { metal: 'Au' } })).toBe(1);
    expect(await DayRate.count({ where: { metal: 'Au' } })).toBe(1);
  });

  it.each(['garbage-nan', 'garbage-huge', 'garbage-negative', 'garbage-zero'])(
    'refuses %s of gold and keeps the others',
    async (scenario) => {
      await control('/control/scenario', { scenario, code: 'XAU' });
      expect(await pollQuotes()).toMatchObject({ outcome: 'partly' });
      expect(await Quote.count({ where: { metal: 'Au' } })).toBe(0);
      expect(await Quote.count({ where: { metal: 'Ag' } })).toBe(1);
    },
  );

  it.each([
    ['garbage-html', 'refused'],
    ['garbage-currency', 'refused'],
    ['down', 'unreachable'],
    ['reset', 'unreachable'],
  ])('stores nothing when the service is %s', async (scenario, outcome) => {
    await control('/control/scenario', { scenario });
    expect(await pollQuotes()).toMatchObject({ outcome });
    expect(await Quote.count()).toBe(0);
    expect(await QuotePoll.count()).toBe(1);
  });

  it('refuses a stale value', async () => {
    await control('/control/scenario', { scenario: 'stale', code: 'XAU' });
    expect(await pollQuotes()).toMatchObject({ outcome: 'partly', Au: 'stale' });
    expect(await Quote.count({ where: { metal: 'Au' } })).toBe(0);
  });

  it('says plainly that nothing is fresh after five minutes of silence', async () => {
    await pollQuotes();
    const newest = await Quote.findOne({ where: { metal: 'Au' }, rejectOnEmpty: true });
    pinDatabaseTime(new Date(newest.quotedAt.getTime() + 301_000));
    const answer = await (await app.visitor()).get('/api/v1/quotes').expect(200);
    expect(answer.body.state).toBe('stale');
    expect(answer.body.quotes[0].isFresh).toBe(false);
  });

  it('says that the market is closed and until when', async () => {
    await pollQuotes();
    await control('/control/scenario', { scenario: 'closed' });
    await pollQuotes();
    const answer = await (await app.visitor()).get('/api/v1/quotes').expect(200);
    expect(answer.body.state).toBe('closed');
    expect(Date.parse(answer.body.marketUntil)).toBeGreaterThan(Date.now());
  });

  it('says that there is none before the first', async () => {
    const answer = await (await app.visitor()).get('/api/v1/quotes').expect(200);
    expect(answer.body).toMatchObject({ state: 'none', quotes: [] });
  });
});

describe('the quarantine', () => {
  const start = new Date('2026-12-01T10:00:00.000Z');
  const read = async (mid: string, seconds: number) => {
    const at = new Date(start.getTime() + seconds * 1000);
    pinDatabaseTime(at);
    return withTransaction({}, (unit) =>
      storeReading({ metal: 'Au', mid, bid: null, ask: null, at }, 'test', true, unit),
    );
  };

  it('holds a jump until the next two polls confirm it; meanwhile the accepted value stands', async () => {
    await read('4000', 0);
    expect((await read('4400', 60)).kind).toBe('quarantine');
    const board = await newestQuotes(new Date(start.getTime() + 60_000));
    expect(board.byMetal.Au).toMatchObject({ usdPerTroyOunce: '4000', isQuarantined: true });
    expect((await read('4402', 120)).kind).toBe('quarantine');
    expect((await read('4399', 180)).kind).toBe('accept');
    const after = await newestQuotes(new Date(start.getTime() + 180_000));
    expect(after.byMetal.Au).toMatchObject({ usdPerTroyOunce: '4399', isQuarantined: false });
    expect(await QuoteCandidate.count()).toBe(0);
  });

  it('tells an admin once after ten polls that do not confirm', async () => {
    await read('4000', 0);
    for (let poll = 1; poll <= 12; poll += 1) await read(String(4400 + poll * 100), poll * 60);
    expect(await AuditEntry.count({ where: { act: 'quote-not-confirmed' } })).toBe(1);
    expect(await QuoteCandidate.findOne({ where: { metal: 'Au' } })).toMatchObject({ polls: 12 });
  });
});

describe('history', () => {
  it('answers the first accepted value of each day', async () => {
    for (const [day, mid] of [
      ['2026-11-29', '4100'],
      ['2026-11-29', '4110'],
      ['2026-11-30', '4120.5'],
    ] as const) {
      const at = new Date(`${day}T08:00:00.000Z`);
      at.setUTCMinutes(await Quote.count());
      pinDatabaseTime(at);
      await withTransaction({}, (unit) =>
        storeReading({ metal: 'Au', mid, bid: null, ask: null, at }, 'test', true, unit),
      );
    }
    pinDatabaseTime(new Date('2026-12-01T12:00:00.000Z'));
    const answer = await (await app.visitor()).get('/api/v1/quotes/history?metal=Au&days=10').expect(200);
    expect(
      answer.body.points.map((point: { day: string; usdPerTroyOunce: string }) => [
        point.day,
        point.usdPerTroyOunce,
      ]),
    ).toEqual([
      ['2026-11-29', '4100'],
      ['2026-11-30', '4120.5'],
    ]);
  });

  it('refuses a metal without quotes and a span beyond a year', async () => {
    const visitor = await app.visitor();
    const metal = await visitor.get('/api/v1/quotes/history?metal=Cu').expect(422);
    expect(metal.body.errors[0].pointer).toBe('/metal');
    await visitor.get('/api/v1/quotes/history?metal=Au&days=367').expect(422);
  });
});
