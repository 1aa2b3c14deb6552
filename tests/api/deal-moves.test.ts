import { describe, expect, it } from 'vitest';
import { canDealBecome, DEAL_STATES, isDealEnded, type DealState } from '#shared/deal-states.ts';
import { sequelize } from '#server/database/connection.ts';
import { findDifferingSheets } from '#server/features/sheets/find-differing-sheets.ts';
import { moveDeal, recordDealEvent } from '#server/features/deals/move-deal.ts';
import { Deal, DealEvent, DealSheet } from '#server/models/index.ts';
import { buildDeal, inDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

await startTestApp();

const pairs = DEAL_STATES.flatMap((from) => DEAL_STATES.map((to) => ({ from, to })));

async function put({ id, lot }: BuiltDeal, state: DealState): Promise<Deal> {
  await Deal.update({ state, liveLotId: isDealEnded(state) ? null : lot.id }, { where: { id } });
  return Deal.findByPk(id, { rejectOnEmpty: true });
}

const move = (built: BuiltDeal, deal: Deal, to: DealState) =>
  inDeal(built, (unit) => moveDeal(deal, to, { act: 'test', actorKind: 'house' }, unit));

describe('moving a deal', () => {
  it('follows the table and nothing else: every other change is refused and changes nothing', async () => {
    const built = await buildDeal();
    let moves = 0;
    for (const { from, to } of pairs) {
      const deal = await put(built, from);
      const events = await DealEvent.count({ where: { dealId: built.id } });
      if (canDealBecome(from, to)) {
        await move(built, deal, to);
        const last = await DealEvent.findOne({
          where: { dealId: built.id },
          order: [['sequence', 'DESC']],
          rejectOnEmpty: true,
        });
        expect(last).toMatchObject({ fromState: from, toState: to, sequence: events + 1 });
        moves += 1;
        continue;
      }
      await expect(move(built, deal, to), `${from} to ${to}`).rejects.toMatchObject({
        code: 'illegal-transition',
        status: 409,
      });
      expect((await Deal.findByPk(built.id, { rejectOnEmpty: true })).state).toBe(from);
      expect(await DealEvent.count({ where: { dealId: built.id } })).toBe(events);
    }
    expect(moves).toBeGreaterThan(30);
  });

  it('frees the lot for another deal when it ends, and only then', async () => {
    const built = await buildDeal();
    expect((await Deal.findByPk(built.id))?.liveLotId).toBe(built.lot.id);
    const ended = await move(built, await put(built, 'agreed'), 'lapsed');
    expect(ended.liveLotId).toBeNull();
    expect(ended.endedAt).not.toBeNull();
  });

  it('numbers the events without a gap, also when they race', async () => {
    const built = await buildDeal();
    await Promise.all(
      Array.from({ length: 12 }, () =>
        inDeal(built, async (unit) => {
          const deal = await Deal.findByPk(built.id, { transaction: unit.tx, rejectOnEmpty: true });
          await recordDealEvent(deal, { act: 'test', actorKind: 'house' }, unit);
        }),
      ),
    );
    const events = await DealEvent.findAll({ where: { dealId: built.id }, order: [['sequence', 'ASC']] });
    expect(events.map(({ sequence }) => sequence)).toEqual(
      Array.from({ length: 13 }, (_, index) => index + 1),
    );
  });

  it('leaves its events as they were written: the application may neither change nor remove them', async () => {
    const built = await buildDeal();
    const refused = { original: { code: 'ER_TABLEACCESS_DENIED_ERROR' } };
    const change = sequelize.query(`UPDATE deal_events SET act = 'x' WHERE deal_id = '${built.id}'`);
    await expect(change).rejects.toMatchObject(refused);
    const removal = sequelize.query(`DELETE FROM deal_sheets WHERE deal_id = '${built.id}'`);
    await expect(removal).rejects.toMatchObject(refused);
  });
});

describe('the stored sheets', () => {
  it('recompute, and a difference by one cent is found', async () => {
    const built = await buildDeal({ state: 'settled' });
    expect(await findDifferingSheets()).toEqual([]);
    expect(await DealSheet.count({ where: { dealId: built.id } })).toBe(2);
    const deal = await Deal.findByPk(built.id, { rejectOnEmpty: true });
    await deal.update({ commissionMinor: deal.commissionMinor + 1n });
    expect(await findDifferingSheets()).toEqual([
      `deal ${built.code}, provisional sheet: /net of the deal differs`,
      `deal ${built.code}, final sheet: /net of the deal differs`,
    ]);
  });
});
