import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { dayOf, daysLater } from '#shared/calendar-day.ts';
import type { DraftContent } from '#shared/schemas/lots.ts';
import { closeLotsJob } from '#jobs/close-lots.ts';
import { rekeyLotsJob } from '#jobs/rekey-lots.ts';
import { runJob } from '#jobs/run-job.ts';
import { sequelize } from '#server/database/connection.ts';
import { newId } from '#server/database/ids.ts';
import { databaseNow, pinDatabaseTime } from '#server/database/transaction.ts';
import '#server/models/index.ts';
import { Certificate } from '#server/models/certificate.ts';
import { DayRate } from '#server/models/day-rate.ts';
import { Lot } from '#server/models/lot.ts';
import { LotEvent } from '#server/models/lot-event.ts';
import { Quote } from '#server/models/quote.ts';
import { buildLot } from '#tests/factories/build-lot.ts';

afterEach(() => pinDatabaseTime(null));
afterAll(() => sequelize.close());

const find = (id: string) => Lot.findByPk(id, { rejectOnEmpty: true });
let now: Date;
beforeAll(async () => {
  now = await databaseNow();
});

describe('closing lots', () => {
  it('closes open and paused ones on their day, frees the certificate, and leaves the others', async () => {
    const closesOn = dayOf(daysLater(now, 10));
    const open = await buildLot({ draft: { closesOn } });
    const paused = await buildLot({ state: 'paused', draft: { closesOn } });
    const reserved = await buildLot({ draft: { closesOn } });
    await Lot.update({ state: 'reserved' }, { where: { id: reserved.id } });
    const later = await buildLot({ draft: { closesOn: dayOf(daysLater(now, 20)) } });

    pinDatabaseTime(new Date(`${closesOn}T23:59:59.000Z`));
    expect(await runJob(closeLotsJob)).toEqual({ closed: 0, failed: 0 });
    pinDatabaseTime(daysLater(new Date(`${closesOn}T00:00:00.000Z`), 1));
    expect(await runJob(closeLotsJob)).toEqual({ closed: 2, failed: 0 });
    expect(await runJob(closeLotsJob)).toEqual({ closed: 0, failed: 0 });

    expect((await find(open.id)).state).toBe('closed');
    expect(await find(paused.id)).toMatchObject({
      state: 'closed',
      stateReason: 'Its closing day has come.',
    });
    expect((await find(reserved.id)).state).toBe('reserved');
    expect((await find(later.id)).state).toBe('open');
    expect(await Certificate.findOne({ where: { lotId: open.id } })).toMatchObject({ liveKey: null });
    expect(await LotEvent.findOne({ where: { lotId: open.id, act: 'closed' } })).toMatchObject({
      actorKind: 'house',
      fromState: 'open',
      toState: 'closed',
    });
  });

  it('closes a lot without a chosen day after 90 days', async () => {
    const lot = await buildLot();
    const { openedAt } = await find(lot.id);
    pinDatabaseTime(new Date(daysLater(openedAt!, 90).getTime() - 1));
    await runJob(closeLotsJob);
    expect((await find(lot.id)).state).toBe('open');
    pinDatabaseTime(daysLater(openedAt!, 90));
    await runJob(closeLotsJob);
    expect((await find(lot.id)).state).toBe('closed');
  });
});

async function setDayRate(day: string, usdPerTroyOunce: string): Promise<void> {
  const at = new Date(`${day}T00:00:30.000Z`);
  const quoteId = newId();
  const source = `test-${quoteId}`;
  await Quote.create({ id: quoteId, metal: 'Ag', usdPerTroyOunce, source, quotedAt: at, acceptedAt: at });
  await DayRate.create({ id: newId(), metal: 'Ag', day, quoteId, usdPerTroyOunce });
}

describe('re-keying lots', () => {
  const part = (metal: string, value: string): DraftContent => ({
    metal,
    fineness: { value, unit: 'permille' },
    uncertainty: { value: '0.5', unit: 'permille' },
    method: 'fire_assay',
    paidFor: true,
  });

  it('follows the day’s first rates where more than one metal is paid for, and only there', async () => {
    const mixed = await buildLot({
      gross: '100.00',
      price: '8000.00',
      draft: { contents: [part('Au', '600'), part('Ag', '300')] },
    });
    const single = await buildLot();
    const before = { mixed: await find(mixed.id), single: await find(single.id) };
    // 60 g Au + 30 g Ag × 51.125 ÷ 4182.40 = 60.366715… g; 8000.00 ÷ that, computed apart.
    expect(before.mixed).toMatchObject({ mainMetal: 'Au', rankPrice: '132.52336097' });
    expect(await runJob(rekeyLotsJob)).toEqual({ changed: 0, failed: 0 });

    const tomorrow = dayOf(daysLater(now, 1));
    await setDayRate(tomorrow, '102.25');
    expect(await runJob(rekeyLotsJob)).toEqual({ changed: 0, failed: 0 });
    pinDatabaseTime(new Date(`${tomorrow}T06:00:00.000Z`));
    expect(await runJob(rekeyLotsJob)).toEqual({ changed: 1, failed: 0 });
    // 60 + 30 × 102.25 ÷ 4182.40 = 60.733430… g.
    expect(await find(mixed.id)).toMatchObject({ mainMetal: 'Au', rankPrice: '131.72317001' });
    const [rekeyed, after] = [await find(mixed.id), await find(single.id)];
    expect(rekeyed.lockVersion).toBe(before.mixed.lockVersion + 1);
    expect([after.lockVersion, after.rankPrice]).toEqual([
      before.single.lockVersion,
      before.single.rankPrice,
    ]);
    expect(await runJob(rekeyLotsJob)).toEqual({ changed: 0, failed: 0 });
    expect((await find(mixed.id)).lockVersion).toBe(rekeyed.lockVersion);
  });
});
