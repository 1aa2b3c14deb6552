import { addMinutes, subHours } from 'date-fns';
import { Op, UniqueConstraintError } from 'sequelize';
import { dec, plain } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { PRICE_FIX_AGAIN_HOURS, PRICE_FIX_MINUTES } from '#shared/limits.ts';
import { checkPrice, percentText } from '#shared/lot-pricing.ts';
import { isMetal, type Metal } from '#shared/metals.ts';
import { measureLot } from '#shared/settlement/lot-measures.ts';
import { computeMelt } from '#shared/settlement/melt.ts';
import { priceAtPercentOfMelt } from '#shared/settlement/percent-of-melt.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import { ConflictError, ForbiddenError, NotFoundError, invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { lotEntryOf } from '#server/features/lots/lot-entry.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { priceWaitOf } from '#server/features/quotes/price-wait.ts';
import { quoteRefs, type QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import { Member } from '#server/models/member.ts';
import { PriceFix } from '#server/models/price-fix.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { endPastFix } from './end-price-fix.ts';

/** A lot that has not been in the market; of one that was, a buyer is told that it no longer is. */
const NEVER_SHOWN: readonly Lot['state'][] = ['draft', 'submitted', 'returned'];

type LinkedLot = Lot & { linkedPercent: string };

async function readFixableLot(lotId: string, unit: Unit, actor: Actor): Promise<LinkedLot> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null || (lot.sellerId !== actor.id && NEVER_SHOWN.includes(lot.state)))
    throw new NotFoundError();
  if (lot.sellerId === actor.id) throw new ConflictError('own-lot');
  if (lot.state === 'reserved' || lot.state === 'sold') throw new ConflictError('lot-taken');
  const isPastClosing = lot.closesAt !== null && lot.closesAt <= unit.now;
  if (lot.state !== 'open' || isPastClosing) throw new ConflictError('lot-not-open');
  if (lot.linkedPercent === null) throw new ConflictError('price-not-linked');
  const seller = await Member.findByPk(lot.sellerId, { transaction: unit.tx });
  if (seller === null || seller.suspendedAt !== null) throw new ConflictError('lot-not-open');
  return lot as LinkedLot;
}

/** Fair play: one open fix a member. The member's lock is held. */
async function assertMayFix(unit: Unit, actor: Actor): Promise<void> {
  const member = await Member.findByPk(actor.id, { transaction: unit.tx });
  if (member === null || member.suspendedAt !== null) throw new ForbiddenError('member-suspended');
  const held = await PriceFix.count({ where: { openMemberId: actor.id }, transaction: unit.tx });
  if (held > 0) throw new ConflictError('price-fix-held');
}

/** Fair play: the same lot again only after a day, however the fix before it ended. */
async function assertNotAgain(lotId: string, unit: Unit, actor: Actor): Promise<void> {
  const since = subHours(unit.now, PRICE_FIX_AGAIN_HOURS);
  const where = { memberId: actor.id, lotId, fixedAt: { [Op.gt]: since } };
  if ((await PriceFix.count({ where, transaction: unit.tx })) === 0) return;
  throw new ConflictError(
    'price-fix-too-soon',
    `You have fixed this lot’s price within ${PRICE_FIX_AGAIN_HOURS} hours.`,
  );
}

function assertQuotesServe(board: QuoteBoard, metals: readonly Metal[]): void {
  const wait = priceWaitOf(board, metals);
  if (wait === null) return;
  if (wait.reason !== 'closed')
    throw new ConflictError('no-fresh-quote', 'The price waits for a fresh quote.');
  throw new ConflictError(
    'market-closed',
    wait.until === null ? 'The price waits until the market opens.' : `The price waits until ${wait.until}.`,
  );
}

/** The price at the board's quotes, by the lines of the sheet: percentage of melt, rounded once. */
async function priceAt(
  lot: LinkedLot,
  board: QuoteBoard,
  unit: Unit,
): Promise<{ priceMinor: bigint; quotes: QuoteRef[] }> {
  const assays = await LotAssay.findAll({
    where: { lotId: lot.id, assayVersion: lot.assayVersion },
    transaction: unit.tx,
  });
  const entry = lotEntryOf(lot, assays);
  invariant(entry !== null, 'an open lot has its mass and its assay');
  const paid = entry.contents.flatMap(({ metal, paidFor }) => (paidFor && isMetal(metal) ? [metal] : []));
  assertQuotesServe(board, paid);
  const quotes = quoteRefs(board).filter(({ metal }) => paid.includes(metal));
  const { valueMinor } = computeMelt(measureLot(entry), quotes);
  const priceMinor = priceAtPercentOfMelt(valueMinor, plain(dec(lot.linkedPercent)));
  try {
    checkPrice(priceMinor);
  } catch (error) {
    if (error instanceof MeasureError) throw new ConflictError('price-out-of-bounds', error.message);
    throw error;
  }
  return { priceMinor, quotes };
}

async function insertFix(
  lot: LinkedLot,
  { priceMinor, quotes }: { priceMinor: bigint; quotes: QuoteRef[] },
  unit: Unit,
  actor: Actor,
): Promise<PriceFix> {
  try {
    return await PriceFix.create(
      {
        id: newId(),
        memberId: actor.id,
        lotId: lot.id,
        state: 'open',
        openMemberId: actor.id,
        openLotId: lot.id,
        percent: lot.linkedPercent,
        priceMinor,
        quotes,
        fixedAt: unit.now,
        fixedUntil: addMinutes(unit.now, PRICE_FIX_MINUTES),
      },
      { transaction: unit.tx },
    );
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new ConflictError('price_fixes_open_lot' in error.fields ? 'lot-taken' : 'price-fix-held');
  }
}

/**
 * Turns a linked price into a sum for one buyer, at the newest quotes, which it names and keeps; the lot is reserved for him
 * for ten minutes by the database's clock. Another's fix whose time is over is ended first, whether its job has run or not.
 *
 * Expects the locks of the member and of the lot; two UNIQUE keys stand behind them.
 * Throws `not-found`, `member-suspended`, `own-lot`, `lot-taken`, `lot-not-open`, `price-not-linked`, `price-fix-held`,
 * `price-fix-too-soon`, `no-fresh-quote`, `market-closed`, `price-out-of-bounds`.
 */
export async function fixPrice(
  { lotId }: { lotId: string },
  unit: Unit & { quotes: QuoteBoard },
  actor: Actor,
): Promise<{ fix: PriceFix; lot: Lot }> {
  await endPastFix({ lotId }, unit);
  await assertMayFix(unit, actor);
  const lot = await readFixableLot(lotId, unit, actor);
  await assertNotAgain(lotId, unit, actor);
  const fix = await insertFix(lot, await priceAt(lot, unit.quotes, unit), unit, actor);
  const detail = { percent: percentText(fix.percent), until: fix.fixedUntil.toISOString() };
  const who = { actorKind: 'buyer', actorId: actor.id } as const;
  await moveLot(lot, 'reserved', { act: 'price-fixed', ...who, detail }, unit);
  return { fix, lot };
}
