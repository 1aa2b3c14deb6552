import { QueryTypes, type Order } from 'sequelize';
import { NotFoundError } from '#server/app-error.ts';
import { sequelize } from '#server/database/connection.ts';
import { Certificate } from '#server/models/certificate.ts';
import { CertificateResult } from '#server/models/certificate-result.ts';
import { Deal } from '#server/models/deal.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import { LotEvent } from '#server/models/lot-event.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { Member } from '#server/models/member.ts';
import { StoredFile } from '#server/models/stored-file.ts';

const WAITING_MAX = 200;
const DECIDED_MAX = 50;

/** A certificate with all that the desk looks at; what is included is loaded. */
export type LoadedCase = {
  certificate: Certificate;
  lot: Lot;
  seller: Member;
  file: StoredFile;
  laboratory: Laboratory | null;
  results: CertificateResult[];
  assays: LotAssay[];
  photos: LotPhoto[];
};

const everything = [
  { model: CertificateResult, as: 'results' },
  { model: StoredFile, as: 'file' },
  { model: Laboratory, as: 'laboratory' },
  {
    model: Lot,
    as: 'lot',
    include: [
      { model: Member, as: 'seller' },
      { model: LotAssay, as: 'assays' },
      { model: LotPhoto, as: 'photos', include: [{ model: StoredFile, as: 'file' }] },
    ],
  },
];

function byPosition<Row extends { position: number }>(rows: readonly Row[] | undefined): Row[] {
  return [...(rows ?? [])].sort((left, right) => left.position - right.position);
}

function loaded(certificate: Certificate): LoadedCase {
  const lot = certificate.lot!;
  const assays = (lot.assays ?? []).filter((assay) => assay.assayVersion === certificate.assayVersion);
  return {
    certificate,
    lot,
    seller: lot.seller!,
    file: certificate.file!,
    laboratory: certificate.laboratory ?? null,
    results: byPosition(certificate.results),
    assays: byPosition(assays),
    photos: byPosition(lot.photos),
  };
}

export async function findCase(id: string): Promise<LoadedCase | null> {
  const certificate = await Certificate.findByPk(id, { include: everything });
  return certificate === null ? null : loaded(certificate);
}

/** The lot that a certificate belongs to, so that a route knows which guard row to take. */
export async function lotIdOfCertificate(id: string): Promise<string> {
  const certificate = await Certificate.findByPk(id, { attributes: ['lotId'] });
  if (certificate === null) throw new NotFoundError();
  return certificate.lotId;
}

async function casesInOrder(ids: readonly string[]): Promise<LoadedCase[]> {
  const certificates = await Certificate.findAll({ where: { id: [...ids] }, include: everything });
  const byId = new Map(certificates.map((certificate) => [certificate.id, loaded(certificate)]));
  return ids.flatMap((id) => byId.get(id) ?? []);
}

async function waitingIds(): Promise<string[]> {
  const rows = await sequelize.query<{ id: string }>(
    `SELECT c.id FROM certificates c JOIN lots l ON l.id = c.lot_id
     WHERE c.state IN ('submitted', 'claimed') AND l.state = 'submitted'
     ORDER BY c.submitted_at, c.id LIMIT ${WAITING_MAX}`,
    { type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.id);
}

/** What waits, oldest first, and the fifty decided last. */
export async function queueOfCases(): Promise<{ waiting: LoadedCase[]; decided: LoadedCase[] }> {
  const order: Order = [
    ['decidedAt', 'DESC'],
    ['id', 'DESC'],
  ];
  const decided = await Certificate.findAll({
    where: { state: ['verified', 'examined', 'returned'] },
    attributes: ['id'],
    order,
    limit: DECIDED_MAX,
  });
  return {
    waiting: await casesInOrder(await waitingIds()),
    decided: await casesInOrder(decided.map((certificate) => certificate.id)),
  };
}

export async function namesOfMembers(ids: readonly (string | null)[]): Promise<Map<string, string>> {
  const known = [...new Set(ids.filter((id): id is string => id !== null))];
  const members = await Member.findAll({ where: { id: known }, attributes: ['id', 'displayName'] });
  return new Map(members.map((member) => [member.id, member.displayName]));
}

export async function historyOfLot(lotId: string): Promise<LotEvent[]> {
  return LotEvent.findAll({
    where: { lotId },
    order: [
      ['at', 'ASC'],
      ['id', 'ASC'],
    ],
  });
}

/** Deals of a seller that came to their payout. */
export async function completedDealsOf(sellerId: string): Promise<number> {
  return Deal.count({ where: { sellerId, state: 'paid_out' } });
}
