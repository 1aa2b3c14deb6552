import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { createQuoteClient, QuoteServiceError } from '#server/integrations/quotes.ts';
import { startQuotesFake, type QuotesFakeOptions } from '#tests/fakes/quotes/start-quotes-fake.ts';

const opening = Date.parse('2026-12-01T09:30:00Z');
const toClose: (() => Promise<void> | void)[] = [];

afterEach(async () => {
  for (const close of toClose.splice(0).reverse()) await close();
});

async function start(options: QuotesFakeOptions = {}) {
  const clock = { nowMs: opening };
  const fake = await startQuotesFake({
    apiKey: 'key-for-tests',
    seed: 7,
    startedAtMs: opening,
    systemNowMs: () => clock.nowMs,
    ...options,
  });
  toClose.push(fake.close);
  const client = createQuoteClient({ url: fake.url, apiKey: 'key-for-tests', timeoutMs: 500 });
  const control = async (name: string, body: object) => {
    const response = await fetch(`${fake.url}/control/${name}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
    });
    return response.status;
  };
  const failure = async () => {
    const error: unknown = await client.fetchQuotes().catch((reason: unknown) => reason);
    expect(error).toBeInstanceOf(QuoteServiceError);
    return error as QuoteServiceError;
  };
  return { fake, client, clock, control, failure };
}

const midsOf = (reading: Awaited<ReturnType<ReturnType<typeof createQuoteClient>['fetchQuotes']>>) =>
  reading.quotes.map((quote) => (quote.ok ? quote.mid : quote.reason));

describe('quotes: a normal reading', () => {
  it('opens at the invented values, with bid below and ask above, and an open market', async () => {
    const { client } = await start();
    const reading = await client.fetchQuotes();
    expect(midsOf(reading)).toEqual(['4182.40', '52.35', '1604.00', '1432.00']);
    expect(reading.quotes[0]).toEqual({
      metal: 'Au',
      ok: true,
      mid: '4182.40',
      bid: '4180.10',
      ask: '4184.70',
      at: new Date(opening),
    });
    expect(reading.marketOpen).toBe(true);
    expect(reading.marketUntil).toEqual(new Date('2026-12-04T22:00:00Z'));
    expect(reading.receivedRaw).toHaveLength(4);
  });

  it('moves only with the minute, the same way for the same seed, another for another seed', async () => {
    const [one, again, other] = [await start(), await start(), await start({ seed: 8 })];
    one.clock.nowMs += 59_999;
    expect(midsOf(await one.client.fetchQuotes())[0]).toBe('4182.40');
    for (const each of [one, again, other]) each.clock.nowMs = opening + 90 * 60_000;
    const mids = midsOf(await one.client.fetchQuotes());
    expect(mids[0]).not.toBe('4182.40');
    expect(midsOf(await again.client.fetchQuotes())).toEqual(mids);
    expect(midsOf(await other.client.fetchQuotes())).not.toEqual(mids);
  });

  it('steps by its own clock when told to', async () => {
    const { client, control } = await start();
    expect(await control('clock', { advanceSeconds: 3600 })).toBe(200);
    const [gold] = (await client.fetchQuotes()).quotes;
    expect(gold).toMatchObject({ ok: true, at: new Date(opening + 3_600_000) });
  });

  it('keeps its walk, clock and held values over a restart', async () => {
    const dataDir = mkdtempSync(path.join(tmpdir(), 'quotes-fake-'));
    toClose.push(() => rmSync(dataDir, { recursive: true }));
    const first = await start({ dataDir });
    await first.control('clock', { advanceSeconds: 7200 });
    await first.control('set', { code: 'XPT', mid: '1700.5' });
    const before = midsOf(await first.client.fetchQuotes());
    const second = await start({ dataDir, seed: 99, startedAtMs: opening + 5 });
    expect(midsOf(await second.client.fetchQuotes())).toEqual(before);
    expect(before[2]).toBe('1700.50');
  });
});

describe('quotes: history', () => {
  it('gives one value a day for 60 days back, on the walk that today is quoted from', async () => {
    const { client, clock, control } = await start();
    const days = await client.fetchHistory(new Date('2026-01-01'), new Date('2026-12-01'));
    expect(days).toHaveLength(4 * 60);
    const history = await client.fetchHistory(new Date('2026-11-30'), new Date('2026-12-01'));
    expect(history.map(({ metal, date }) => `${metal} ${date}`)).toEqual([
      'Au 2026-11-30',
      'Ag 2026-11-30',
      'Pt 2026-11-30',
      'Pd 2026-11-30',
    ]);
    clock.nowMs = Date.parse('2026-12-01T16:00:00Z');
    const [gold] = (await client.fetchQuotes()).quotes;
    const today = await client.fetchHistory(new Date('2026-12-01'), new Date('2026-12-01'));
    expect(gold).toMatchObject({ ok: true, mid: today[0]?.mid, at: today[0]?.at });
    await control('clock', { advanceSeconds: 86_400 });
    expect(await client.fetchHistory(new Date('2026-12-01'), new Date('2026-12-01'))).toEqual(today);
  });

  it('refuses dates in the wrong order', async () => {
    const { client } = await start();
    await expect(client.fetchHistory(new Date('2026-12-01'), new Date('2026-11-01'))).rejects.toMatchObject({
      reason: 'status',
      status: 400,
    });
  });
});

describe('quotes: one bad metal', () => {
  it.each([
    ['garbage-nan', 'malformed'],
    ['garbage-huge', 'out-of-bounds'],
    ['garbage-negative', 'not-positive'],
    ['garbage-zero', 'not-positive'],
  ])('%s is marked %s and leaves the others good', async (scenario, reason) => {
    const { client, control } = await start();
    await control('scenario', { scenario, code: 'XAG' });
    expect(midsOf(await client.fetchQuotes())).toEqual(['4182.40', reason, '1604.00', '1432.00']);
    await control('scenario', { scenario: 'normal', code: 'XAG' });
    expect(midsOf(await client.fetchQuotes())[1]).toBe('52.35');
  });

  it('stale shows an old time and the same value', async () => {
    const { client, control } = await start();
    await control('scenario', { scenario: 'stale', code: 'XAU' });
    const [gold, silver] = (await client.fetchQuotes()).quotes;
    expect(gold).toMatchObject({ ok: true, mid: '4182.40', at: new Date(opening - 20 * 60_000) });
    expect(silver).toMatchObject({ ok: true, at: new Date(opening) });
  });

  it('spike lifts one metal for as many polls as ordered', async () => {
    const { client, control } = await start();
    await control('scenario', { scenario: 'spike', code: 'XAU', percent: '5', polls: 2 });
    const gold = async () => midsOf(await client.fetchQuotes())[0];
    // 4182.40 × 1.05 = 4391.52
    expect([await gold(), await gold(), await gold()]).toEqual(['4391.52', '4391.52', '4182.40']);
  });

  it('holds a value that was set until it is released', async () => {
    const { client, clock, control } = await start();
    await control('set', { code: 'XPD', mid: '1500.00' });
    clock.nowMs += 600_000;
    expect(midsOf(await client.fetchQuotes())[3]).toBe('1500.00');
    await control('set', { code: 'XPD', mid: null });
    expect(midsOf(await client.fetchQuotes())[3]).not.toBe('1500.00');
    expect(await control('set', { code: 'XPD', mid: '-3' })).toBe(400);
  });
});

describe('quotes: the whole service', () => {
  it.each([
    ['down', 'status'],
    ['reset', 'unreachable'],
    ['slow', 'timeout'],
    ['garbage-html', 'garbage'],
    ['garbage-currency', 'garbage'],
  ])('%s fails as %s, once when ordered for one poll', async (scenario, reason) => {
    const { client, control, failure } = await start({ slowMs: 1500 });
    await control('scenario', { scenario, polls: 1 });
    expect((await failure()).reason).toBe(reason);
    expect((await client.fetchQuotes()).quotes.every(({ ok }) => ok)).toBe(true);
  });

  it('is unreachable when nothing listens', async () => {
    const { fake, failure } = await start();
    await fake.close();
    toClose.length = 0;
    expect((await failure()).reason).toBe('unreachable');
  });

  it('refuses a wrong key', async () => {
    const { fake } = await start();
    const stranger = createQuoteClient({ url: fake.url, apiKey: 'another-key' });
    await expect(stranger.fetchQuotes()).rejects.toMatchObject({ reason: 'status', status: 401 });
  });

  it('closed keeps the closing values and times, names the reopening, and reopens then', async () => {
    const { client, clock, control } = await start();
    await control('scenario', { scenario: 'closed' });
    clock.nowMs += 3_600_000;
    const closed = await client.fetchQuotes();
    expect(closed).toMatchObject({ marketOpen: false, marketUntil: new Date(opening + 8 * 3_600_000) });
    expect(closed.quotes[0]).toMatchObject({ mid: '4182.40', at: new Date(opening) });
    clock.nowMs += 7 * 3_600_000;
    expect(await client.fetchQuotes()).toMatchObject({ marketOpen: true });
  });

  it('refuses orders that make no sense', async () => {
    const { control } = await start();
    expect(await control('scenario', { scenario: 'upside-down' })).toBe(400);
    expect(await control('scenario', { scenario: 'down', code: 'XAU' })).toBe(400);
    expect(await control('scenario', { scenario: 'spike', code: 'XAU', percent: '-100' })).toBe(400);
  });
});

describe('quotes: answers the stand-in never gives', () => {
  const entry = { code: 'XAU', bid: '4180.10', ask: '4184.70', mid: '4182.40', at: '2026-12-01T09:30:00Z' };
  const answer = {
    currency: 'USD',
    unit: 'troy_ounce',
    market: { open: true, until: '2026-12-04T22:00:00Z' },
    quotes: [entry] as unknown[],
  };

  async function readingOf(body: object) {
    const server = createServer((_req, res) => res.end(JSON.stringify(body)));
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    toClose.push(() => void server.close());
    const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}/`;
    return createQuoteClient({ url, apiKey: 'any' }).fetchQuotes();
  }

  it.each([
    [{ ...entry, mid: 4182.4 }, 'malformed'],
    [{ ...entry, mid: '4.18e3' }, 'malformed'],
    [{ ...entry, mid: '4182,40' }, 'malformed'],
    [{ ...entry, at: 'yesterday' }, 'malformed'],
    [{ ...entry, ask: undefined }, 'malformed'],
    [{ ...entry, bid: '4190.00' }, 'spread-crossed'],
    [{ ...entry, code: 'XPT' }, 'missing'],
    [null, 'missing'],
  ])('marks %j as %s', async (received, reason) => {
    const [gold] = (await readingOf({ ...answer, quotes: [received] })).quotes;
    expect(gold).toEqual({ metal: 'Au', ok: false, reason });
  });

  it('marks a metal that is quoted twice', async () => {
    const [gold] = (await readingOf({ ...answer, quotes: [entry, entry] })).quotes;
    expect(gold).toEqual({ metal: 'Au', ok: false, reason: 'repeated' });
  });

  it.each([{ unit: 'gram' }, { currency: 'usd' }, { market: null }, { quotes: {} }])(
    'refuses the reading with %j',
    async (change) => {
      await expect(readingOf({ ...answer, ...change })).rejects.toMatchObject({ reason: 'garbage' });
    },
  );
});
