import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { runJob } from '#jobs/run-job.ts';
import { pauseBelowFloorJob } from '#jobs/pause-below-floor.ts';
import { newId } from '#server/database/ids.ts';
import { Deal, Lot, OutboxMail, Quote } from '#server/models/index.ts';
import { DELIVERY } from '#tests/factories/build-deal.ts';
import { buildLot, buildRates } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const find = (id: string) => Lot.findByPk(id, { rejectOnEmpty: true });
// 0.999900 oz t × 4182.40 = 4181.98, of which 4014.70 are 96.00 % to the cent (95.99998 %)
const build = (floorPercent: string) =>
  buildLot({ gross: '31.103477', permille: '999.9', price: '4014.70', draft: { floorPercent } });

async function setGold(usdPerTroyOunce: string, quotedAt = new Date()): Promise<void> {
  const ids = { id: newId(), source: `test-${newId()}` };
  await Quote.create({ ...ids, metal: 'Au', usdPerTroyOunce, quotedAt, acceptedAt: new Date() });
}
const mailsTo = (memberId: string) => OutboxMail.count({ where: { memberId, mail: 'lot-paused-floor' } });

let visitor: Visitor;
beforeAll(async () => {
  await buildRates();
  visitor = await app.signIn(await buildMember());
});
beforeEach(() => setGold('4182.40'));

describe('a floor in % of melt', () => {
  it('refuses the purchase and pauses the lot in one, for good under its key', async () => {
    const lot = await build('95.00');
    await setGold('4300.00');
    const headers = { 'Idempotency-Key': randomUUID() };
    const body = { total: '4039.70', delivery: DELIVERY, confirmsAge: true, confirmsRules: true };
    const path = `/api/v1/lots/${lot.code}/purchase`;
    const refused = await visitor.post(path, body, headers).expect(409);
    expect(refused.body.code).toBe('price-below-floor');
    expect((await visitor.post(path, body, headers).expect(409)).body.code).toBe('price-below-floor');
    expect((await find(lot.id)).state).toBe('paused');
    expect(await Deal.count({ where: { lotId: lot.id } })).toBe(0);
    expect(await mailsTo(lot.sellerId)).toBe(1);
  });

  it('hinders nothing while the price is not below it', async () => {
    const lot = await build('95.00');
    const headers = { 'Idempotency-Key': randomUUID() };
    const body = { total: '4039.70', delivery: DELIVERY, confirmsAge: true, confirmsRules: true };
    await visitor.post(`/api/v1/lots/${lot.code}/purchase`, body, headers).expect(201);
  });

  it('pauses by the job at fresh quotes alone, with the reason in history and mail', async () => {
    const [low, high] = [await build('90.00'), await build('95.00')];
    await setGold('4300.00', new Date(Date.now() - 301_000));
    expect(await runJob(pauseBelowFloorJob)).toEqual({ paused: 0, failed: 0 });
    await setGold('4300.00');
    expect(await runJob(pauseBelowFloorJob)).toEqual({ paused: 1, failed: 0 });
    expect((await find(low.id)).state).toBe('open');
    const paused = await find(high.id);
    expect(paused).toMatchObject({ state: 'paused', stateReason: expect.stringContaining('95.00 %') });
    expect(await mailsTo(high.sellerId)).toBe(1);
    expect(await runJob(pauseBelowFloorJob)).toEqual({ paused: 0, failed: 0 });
  });
});
