import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { CarrierServiceError, createCarrierClient } from '#server/integrations/carrier.ts';
import { startCarrierFake, type CarrierFakeOptions } from '#tests/fakes/carrier/start-carrier-fake.ts';

const opening = Date.parse('2026-12-01T09:30:00Z');
const parcel = { carrier: 'Fenland Post', trackingNumber: 'FP 12/34', reference: 'deal-1' };
const toClose: (() => Promise<void> | void)[] = [];

afterEach(async () => {
  for (const close of toClose.splice(0).reverse()) await close();
});

async function start(options: CarrierFakeOptions = {}) {
  const clock = { nowMs: opening };
  const fake = await startCarrierFake({ apiKey: 'key', systemNowMs: () => clock.nowMs, ...options });
  toClose.push(fake.close);
  const client = createCarrierClient({ url: fake.url, apiKey: 'key', timeoutMs: 500 });
  const control = async (name: string, body: object = {}) => {
    const response = await fetch(`${fake.url}/control/${name}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
    });
    return response.status;
  };
  const read = () => client.readTracker(parcel.carrier, parcel.trackingNumber);
  const order = (name: string) => control(`trackers/${encodeURIComponent(parcel.trackingNumber)}/${name}`);
  return { fake, client, clock, control, read, order };
}

describe('carrier: a parcel', () => {
  it('is registered once for a carrier and number', async () => {
    const { client } = await start();
    const first = await client.registerTracker(parcel);
    expect(first).toMatchObject({ status: 'registered', trackingNumber: 'FP 12/34', delivery: null });
    expect(await client.registerTracker({ ...parcel, reference: 'deal-2' })).toEqual(first);
    const other = await client.registerTracker({ ...parcel, carrier: 'Quayside Parcels' });
    expect(other.id).not.toBe(first.id);
  });

  it('is unknown until registered', async () => {
    const { read } = await start();
    expect(await read()).toBeNull();
  });

  it('travels by the clock and arrives signed', async () => {
    const { client, clock, control, read } = await start();
    await client.registerTracker(parcel);
    const seen: (string | undefined)[] = [];
    for (const seconds of [29, 30, 60, 119]) {
      clock.nowMs = opening + seconds * 1000;
      seen.push((await read())?.status);
    }
    expect(seen).toEqual(['registered', 'accepted', 'in_transit', 'in_transit']);
    await control('clock', { advanceSeconds: 3600 });
    const arrived = await read();
    expect(arrived?.status).toBe('delivered');
    expect(arrived?.events.map(({ code }) => code)).toEqual([
      'registered',
      'accepted',
      'in_transit',
      'delivered',
    ]);
    expect(arrived?.delivery).toEqual({
      at: new Date(opening + 120_000),
      signed: true,
      signedBy: 'The receiver',
    });
  });

  it('takes as long as configured, or waits for a button', async () => {
    const quick = await start({ deliverySeconds: 4 });
    await quick.client.registerTracker(parcel);
    quick.clock.nowMs += 4000;
    expect((await quick.read())?.status).toBe('delivered');
    const manual = await start({ deliverySeconds: null });
    await manual.client.registerTracker(parcel);
    manual.clock.nowMs += 30 * 86_400_000;
    expect((await manual.read())?.status).toBe('registered');
  });

  it.each([
    ['deliver', 'delivered', true],
    ['deliver-unsigned', 'delivered', false],
    ['lose', 'lost', null],
    ['return', 'returned', null],
  ])('on %s it is %s at once, and stays so', async (name, status, signed) => {
    const { client, clock, read, order } = await start();
    await client.registerTracker(parcel);
    clock.nowMs += 1000;
    expect(await order(name)).toBe(200);
    const ended = await read();
    expect(ended?.status).toBe(status);
    expect(ended?.delivery?.signed ?? null).toBe(signed);
    clock.nowMs += 86_400_000;
    expect(await read()).toEqual(ended);
    expect(await order('deliver')).toBe(409);
  });

  it('is kept over a restart', async () => {
    const dataDir = mkdtempSync(path.join(tmpdir(), 'carrier-fake-'));
    toClose.push(() => rmSync(dataDir, { recursive: true }));
    const first = await start({ dataDir });
    const registered = await first.client.registerTracker(parcel);
    await first.fake.close();
    toClose.pop();
    const second = await start({ dataDir });
    expect(await second.read()).toEqual(registered);
    second.clock.nowMs += 120_000;
    expect((await second.read())?.status).toBe('delivered');
  });
});

describe('carrier: faults', () => {
  it.each([
    ['down', 'status'],
    ['slow', 'timeout'],
    ['garbage', 'garbage'],
  ])('%s fails as %s and ends when cleared', async (kind, reason) => {
    const { client, control, read } = await start({ slowMs: 1500 });
    await client.registerTracker(parcel);
    await control('faults', { kind });
    const error: unknown = await read().catch((thrown: unknown) => thrown);
    expect(error).toBeInstanceOf(CarrierServiceError);
    expect(error).toMatchObject({ reason });
    await control('faults', { kind: 'none' });
    expect((await read())?.status).toBe('registered');
  });

  it('refuses a wrong key, an unknown button and an unknown parcel', async () => {
    const { fake, order } = await start();
    const stranger = createCarrierClient({ url: fake.url, apiKey: 'another' });
    await expect(stranger.registerTracker(parcel)).rejects.toMatchObject({ reason: 'status', status: 401 });
    expect(await order('explode')).toBe(404);
    expect(await order('deliver')).toBe(404);
  });

  const delivered = { at: '2026-12-01T10:00:00Z', code: 'delivered', description: '', place: '' };
  const answer = { id: 't', carrier: parcel.carrier, trackingNumber: parcel.trackingNumber };
  it.each([
    ['another parcel', { ...answer, trackingNumber: 'FP 99', status: 'delivered', events: [delivered] }],
    ['delivered without its event', { ...answer, status: 'delivered', events: [] }],
    ['a status never agreed', { ...answer, status: 'thrown', events: [] }],
    ['a time without a zone', { ...answer, status: 'lost', events: [{ ...delivered, at: '2026-12-01' }] }],
  ])('refuses an answer with %s', async (_name, body) => {
    const server = createServer((_req, res) => res.end(JSON.stringify(body)));
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    toClose.push(() => void server.close());
    const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    const client = createCarrierClient({ url, apiKey: 'any' });
    await expect(client.readTracker(parcel.carrier, parcel.trackingNumber)).rejects.toMatchObject({
      reason: 'garbage',
    });
  });
});
