import { Op } from 'sequelize';
import { NotFoundError } from '#server/app-error.ts';
import { Certificate } from '#server/models/certificate.ts';
import { CertificateResult } from '#server/models/certificate-result.ts';
import { Deal } from '#server/models/deal.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import { LotEvent } from '#server/models/lot-event.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { Member } from '#server/models/member.ts';
import { PriceFix } from '#server/models/price-fix.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canSeeLot } from './lot-policy.ts';

export type LotDetail = {
  lot: Lot;
  assays: LotAssay[];
  photos: LotPhoto[];
  certificate: Certificate | null;
  events: LotEvent[];
  completedDeals: number;
  isSellerSuspended: boolean;
  /** The price fix that holds the lot, whoever has it. */
  fix: PriceFix | null;
  /** The viewer's own deal over this lot, as its buyer or seller. */
  deal: Deal | null;
};

/** The viewer's deal over a lot that still holds it, or else his newest. */
export async function findOwnDeal(lotId: string, viewer: Actor | null): Promise<Deal | null> {
  if (viewer === null) return null;
  return Deal.findOne({
    where: { lotId, [Op.or]: [{ buyerId: viewer.id }, { sellerId: viewer.id }] },
    order: [
      ['liveLotId', 'DESC'],
      ['agreedAt', 'DESC'],
    ],
  });
}

/** Reads a lot that the viewer may see. Throws `not-found` for one that is not there or not his to see. */
export async function findVisibleLot(
  where: { code: string } | { id: string },
  viewer: Actor | null,
): Promise<{ lot: Lot; deal: Deal | null }> {
  const lot = await Lot.findOne({ where });
  if (lot === null) throw new NotFoundError();
  const deal = await findOwnDeal(lot.id, viewer);
  if (!canSeeLot(viewer, lot, deal !== null && deal.buyerId === viewer?.id)) throw new NotFoundError();
  return { lot, deal };
}

/** Deals of a seller that came to their end as agreed. */
export async function countCompletedDeals(sellerId: string): Promise<number> {
  return Deal.count({ where: { sellerId, state: ['settled', 'paid_out'] } });
}

export async function findLotPhotos(lotId: string): Promise<LotPhoto[]> {
  return LotPhoto.findAll({
    where: { lotId },
    include: [{ model: StoredFile, as: 'file' }],
    order: [
      ['position', 'ASC'],
      ['id', 'ASC'],
    ],
  });
}

async function findCertificate(lot: Lot): Promise<Certificate | null> {
  return Certificate.findOne({
    where: { lotId: lot.id, assayVersion: lot.assayVersion },
    include: [
      { model: CertificateResult, as: 'results' },
      { model: Laboratory, as: 'laboratory' },
    ],
  });
}

/** Everything that the page of a lot shows. Throws `not-found`. */
export async function findLotDetail(code: string, viewer: Actor | null): Promise<LotDetail> {
  const { lot, deal } = await findVisibleLot({ code }, viewer);
  const [assays, photos, certificate, events, completedDeals, seller, fix] = await Promise.all([
    LotAssay.findAll({
      where: { lotId: lot.id, assayVersion: lot.assayVersion },
      order: [['position', 'ASC']],
    }),
    findLotPhotos(lot.id),
    findCertificate(lot),
    LotEvent.findAll({
      where: { lotId: lot.id },
      order: [
        ['at', 'ASC'],
        ['id', 'ASC'],
      ],
    }),
    countCompletedDeals(lot.sellerId),
    Member.findByPk(lot.sellerId, { attributes: ['suspendedAt'] }),
    PriceFix.findOne({ where: { openLotId: lot.id } }),
  ]);
  const isSellerSuspended = seller !== null && seller.suspendedAt !== null;
  return { lot, assays, photos, certificate, events, completedDeals, isSellerSuspended, fix, deal };
}

/** First photo of each of several lots, by lot. */
export async function firstPhotos(lotIds: readonly string[]): Promise<Map<string, string>> {
  if (lotIds.length === 0) return new Map();
  const photos = await LotPhoto.findAll({
    where: { lotId: [...lotIds] },
    attributes: ['id', 'lotId', 'position'],
    order: [
      ['lotId', 'ASC'],
      ['position', 'DESC'],
    ],
  });
  // The last one written wins, which is the one with the lowest position.
  return new Map(photos.map((photo) => [photo.lotId, photo.id]));
}
