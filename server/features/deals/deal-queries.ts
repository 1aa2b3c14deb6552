import { Op, type Transaction } from 'sequelize';
import { NotFoundError } from '#server/app-error.ts';
import { heldMinor } from '#server/features/ledger/ledger-queries.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Deal } from '#server/models/deal.ts';
import { DealEvent } from '#server/models/deal-event.ts';
import { DealReceipt } from '#server/models/deal-receipt.ts';
import { DealSheet } from '#server/models/deal-sheet.ts';
import { Lot } from '#server/models/lot.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { Member } from '#server/models/member.ts';
import { Parcel } from '#server/models/parcel.ts';
import { Payout } from '#server/models/payout.ts';
import { Refund } from '#server/models/refund.ts';

/** A deal with all that its page shows. */
export type DealView = {
  deal: Deal & { lot: Lot; seller: Member; buyer: Member };
  events: DealEvent[];
  provisional: DealSheet;
  final: DealSheet | null;
  heldMinor: bigint;
  thumbPhotoId: string | null;
  certificateId: string | null;
};

const PARTIES = [
  { model: Lot, as: 'lot' },
  { model: Member, as: 'seller' },
  { model: Member, as: 'buyer' },
];
const PARTS = [
  { model: Parcel, as: 'parcel' },
  { model: DealReceipt, as: 'receipt' },
  { model: Payout, as: 'payout' },
  { model: Refund, as: 'refund' },
];

const within = (tx: Transaction | undefined) => (tx === undefined ? {} : { transaction: tx });

/** Which guard rows a command on this deal takes. Throws `not-found`. */
export async function findDealIds(
  code: string,
): Promise<Pick<Deal, 'id' | 'lotId' | 'buyerId' | 'sellerId'>> {
  const deal = await Deal.findOne({ where: { code }, attributes: ['id', 'lotId', 'buyerId', 'sellerId'] });
  if (deal === null) throw new NotFoundError();
  return deal;
}

/** The deal with its parcel, receipt and the rest, read after the locks. Throws `not-found`. */
export async function loadDeal(dealId: string, tx?: Transaction): Promise<Deal> {
  const deal = await Deal.findByPk(dealId, { include: [...PARTIES, ...PARTS], ...within(tx) });
  if (deal === null) throw new NotFoundError();
  return deal;
}

async function thumbOf(lotId: string, tx?: Transaction): Promise<string | null> {
  const photo = await LotPhoto.findOne({
    where: { lotId },
    order: [['position', 'ASC']],
    attributes: ['id'],
    ...within(tx),
  });
  return photo?.id ?? null;
}

async function certificateOf(lotId: string, tx?: Transaction): Promise<string | null> {
  const certificate = await Certificate.findOne({
    where: { lotId, state: { [Op.notIn]: ['returned', 'superseded'] } },
    order: [['assayVersion', 'DESC']],
    attributes: ['id'],
    ...within(tx),
  });
  return certificate?.id ?? null;
}

/** Everything of one deal; inside a transaction one query after the other, as a connection carries one at a time. */
export async function loadDealView(dealId: string, tx?: Transaction): Promise<DealView> {
  const deal = (await loadDeal(dealId, tx)) as DealView['deal'];
  const events = await DealEvent.findAll({ where: { dealId }, order: [['sequence', 'ASC']], ...within(tx) });
  const sheets = await DealSheet.findAll({ where: { dealId }, ...within(tx) });
  const provisional = sheets.find(({ moment }) => moment === 'provisional');
  if (provisional === undefined) throw new NotFoundError();
  return {
    deal,
    events,
    provisional,
    final: sheets.find(({ moment }) => moment === 'final') ?? null,
    heldMinor: await heldMinor(dealId, tx),
    thumbPhotoId: await thumbOf(deal.lotId, tx),
    certificateId: await certificateOf(deal.lotId, tx),
  };
}

export type DealListEntry = { deal: DealView['deal']; thumbPhotoId: string | null };
/** Enough for a member's own list; older ones are found by their code. */
const LIST_MAX = 200;

/** All deals of a member, newest change first. */
export async function listDealsOf(memberId: string): Promise<DealListEntry[]> {
  const deals = (await Deal.findAll({
    where: { [Op.or]: [{ buyerId: memberId }, { sellerId: memberId }] },
    include: [...PARTIES, ...PARTS],
    order: [
      ['updatedAt', 'DESC'],
      ['id', 'ASC'],
    ],
    limit: LIST_MAX,
  })) as DealView['deal'][];
  const photos = await LotPhoto.findAll({
    where: { lotId: deals.map(({ lotId }) => lotId) },
    attributes: ['id', 'lotId'],
    order: [['position', 'DESC']],
  });
  const first = new Map(photos.map(({ lotId, id }) => [lotId, id]));
  return deals.map((deal) => ({ deal, thumbPhotoId: first.get(deal.lotId) ?? null }));
}

/** What waits for a ruling, the oldest first. */
export async function listContestedDeals(): Promise<DealView['deal'][]> {
  return (await Deal.findAll({
    where: { state: 'contested' },
    include: PARTIES,
    order: [
      ['contestedAt', 'ASC'],
      ['id', 'ASC'],
    ],
  })) as DealView['deal'][];
}

/** Delivered deals whose time to inspect has passed without an answer, the longest first. */
export async function listOverdueInspections(now: Date): Promise<DealView['deal'][]> {
  return (await Deal.findAll({
    where: { state: 'delivered', frozenAt: null, inspectBy: { [Op.lte]: now } },
    include: PARTIES,
    order: [
      ['inspectBy', 'ASC'],
      ['id', 'ASC'],
    ],
  })) as DealView['deal'][];
}

/** Funded deals whose shipping deadline has passed, for the job that cancels them. */
export async function findUnshippedDeals(now: Date): Promise<{ id: string; lotId: string }[]> {
  return Deal.findAll({
    where: { state: 'funded', frozenAt: null, shipBy: { [Op.lte]: now } },
    attributes: ['id', 'lotId'],
    order: [['shipBy', 'ASC']],
    limit: 500,
  });
}
