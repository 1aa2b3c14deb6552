import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { pollParcels } from '#jobs/poll-parcels.ts';
import { runProviderTasks } from '#jobs/run-provider-tasks.ts';
import { registerParcelTask } from '#server/features/parcels/register-parcel.ts';
import { logger } from '#server/logger.ts';
import { Deal, DealEvent, OutboxMail, Parcel, ProviderTask } from '#server/models/index.ts';
import { buildDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { startCarrierFake } from '#tests/fakes/carrier/start-carrier-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const port = Number.parseInt(new URL(process.env.CARRIER_URL!).port, 10);
let fake: Awaited<ReturnType<typeof startCarrierFake>>;
beforeAll(async () => {
  fake = await startCarrierFake({ port, deliverySeconds: null, slowMs: 6_000 });
});
afterAll(() => fake.close());
beforeEach(() => control('/control/faults', { kind: 'none' }));

async function control(path: string, body: object = {}): Promise<void> {
  const answer = await fetch(`${fake.url}${path}`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', Accept: 'application/json' },
    body: JSON.stringify(body),
  });
  expect(answer.ok, path).toBe(true);
}

const poll = () => pollParcels({ log: logger });
const register = () => runProviderTasks({ register_parcel: registerParcelTask });
const parcelOf = ({ id }: BuiltDeal) => Parcel.findOne({ where: { dealId: id }, rejectOnEmpty: true });
const stateOf = async ({ id }: BuiltDeal) => (await Deal.findByPk(id, { rejectOnEmpty: true })).state;
const actsOf = async ({ id }: BuiltDeal) =>
  (await DealEvent.findAll({ where: { dealId: id }, order: [['sequence', 'ASC']] })).map(({ act }) => act);

async function onTheWay(): Promise<BuiltDeal> {
  const deal = await buildDeal({ state: 'shipped' });
  await register();
  return deal;
}

async function carrier(
  deal: BuiltDeal,
  order: 'deliver' | 'deliver-unsigned' | 'lose' | 'return',
): Promise<void> {
  await control(`/control/trackers/${encodeURIComponent((await parcelOf(deal)).trackingNumber)}/${order}`);
}

describe('registering a parcel', () => {
  it('tells the carrier once, with the deal as reference, and once only', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    expect((await register()).done).toBe(1);
    expect((await register()).done).toBe(0);
    const { trackers } = (await (await fetch(`${fake.url}/control/trackers`)).json()) as {
      trackers: { reference: string; trackingNumber: string }[];
    };
    const { trackingNumber, registeredAt } = await parcelOf(deal);
    expect(trackers.filter((each) => each.trackingNumber === trackingNumber)).toMatchObject([
      { reference: deal.code },
    ]);
    expect(registeredAt).not.toBeNull();
  });

  it('is tried again while the carrier is down', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    await control('/control/faults', { kind: 'down' });
    expect((await register()).due).toBe(1);
    expect((await parcelOf(deal)).registeredAt).toBeNull();
    expect((await ProviderTask.findOne({ where: { dealId: deal.id } }))?.lastError).not.toBeNull();
    await control('/control/faults', { kind: 'none' });
    await ProviderTask.update({ nextAt: new Date(0) }, { where: { dealId: deal.id } });
    expect((await register()).done).toBe(1);
  });
});

describe('following a parcel', () => {
  it('against signature makes the deal delivered, opens the inspection and writes to both', async () => {
    const deal = await onTheWay();
    await carrier(deal, 'deliver');
    expect(await poll()).toMatchObject({ delivered: 1 });
    expect(await stateOf(deal)).toBe('delivered');
    const { inspectBy, deliveredAt } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(deliveredAt).not.toBeNull();
    const days = (inspectBy!.getTime() - Date.now()) / 86_400_000;
    expect(days).toBeGreaterThan(4.99);
    expect(days).toBeLessThanOrEqual(5);
    const mails = await OutboxMail.findAll({ where: { memberId: [deal.buyer.id, deal.seller.id] } });
    expect(mails.map(({ mail }) => mail)).toEqual(
      expect.arrayContaining(['parcel-delivered-buyer', 'parcel-delivered-seller']),
    );
    const before = await actsOf(deal);
    await poll();
    expect(await actsOf(deal)).toEqual(before);
  });

  it('without signature waits for the buyer’s word, and only his', async () => {
    const deal = await onTheWay();
    await carrier(deal, 'deliver-unsigned');
    expect(await poll()).toMatchObject({ 'delivered-unsigned': 1 });
    expect(await stateOf(deal)).toBe('shipped');
    const path = `/api/v1/deals/${deal.code}`;
    const buyer = await app.signIn(deal.buyer);
    expect((await buyer.get(path)).body).toMatchObject({
      can: { confirmDelivery: true },
      due: { who: 'buyer', act: 'Confirm the delivery' },
      parcel: { isSigned: false },
    });
    await (await app.signIn(deal.seller)).post(`${path}/confirm-delivery`).expect(403);
    const { body } = await buyer.post(`${path}/confirm-delivery`).expect(200);
    expect(body).toMatchObject({ state: 'delivered', can: { recordReceipt: true } });
    expect((await buyer.post(`${path}/confirm-delivery`).expect(409)).body.code).toBe('illegal-transition');
  });

  it('confirming is refused while the carrier has not delivered', async () => {
    const deal = await onTheWay();
    const buyer = await app.signIn(deal.buyer);
    const answer = await buyer.post(`/api/v1/deals/${deal.code}/confirm-delivery`).expect(409);
    expect(answer.body.code).toBe('illegal-transition');
    expect(await stateOf(deal)).toBe('shipped');
  });

  it.each(['lose', 'return'] as const)(
    'that the carrier says to %s can be contested at once',
    async (order) => {
      const deal = await onTheWay();
      const buyer = await app.signIn(deal.buyer);
      expect((await buyer.get(`/api/v1/deals/${deal.code}`)).body.can.contest).toBe(false);
      await carrier(deal, order);
      expect(await poll()).toMatchObject({ lost: 1 });
      expect((await buyer.get(`/api/v1/deals/${deal.code}`)).body.can.contest).toBe(true);
      const objection = { reason: 'not_arrived', note: 'The carrier says so itself.' };
      const { body } = await buyer.post(`/api/v1/deals/${deal.code}/contest`, objection).expect(200);
      expect(body.state).toBe('contested');
    },
  );

  it.each(['down', 'garbage'])('waits while the carrier is %s, and changes nothing', async (kind) => {
    const deal = await onTheWay();
    await carrier(deal, 'deliver');
    const before = await actsOf(deal);
    await control('/control/faults', { kind });
    expect((await poll()).unanswered).toBeGreaterThan(0);
    expect(await actsOf(deal)).toEqual(before);
    await control('/control/faults', { kind: 'none' });
    expect(await poll()).toMatchObject({ delivered: 1 });
  });

  it('goes on during a contest: a late delivery is evidence and moves nothing', async () => {
    const deal = await onTheWay();
    await Deal.update({ arriveBy: new Date(0) }, { where: { id: deal.id } });
    const buyer = await app.signIn(deal.buyer);
    const objection = { reason: 'not_arrived', note: 'Nothing has come so far.' };
    await buyer.post(`/api/v1/deals/${deal.code}/contest`, objection).expect(200);
    await carrier(deal, 'deliver');
    await poll();
    expect(await stateOf(deal)).toBe('contested');
    expect(await parcelOf(deal)).toMatchObject({ trackerStatus: 'delivered', isSigned: true });
  });

  it('by two runners at once takes each change over once', async () => {
    const deal = await onTheWay();
    await carrier(deal, 'deliver');
    await Promise.all([poll(), poll()]);
    expect((await actsOf(deal)).filter((act) => act === 'delivered')).toHaveLength(1);
  });
});
