import { createHash, randomBytes } from 'node:crypto';
import { lotDraft, type DraftContent } from '#shared/schemas/lots.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { createDraft } from '#server/features/lots/create-draft.ts';
import { saveDraft } from '#server/features/drafting/save-draft.ts';
import { submitLot } from '#server/features/drafting/submit-lot.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { Certificate } from '#server/models/certificate.ts';
import { DayRate } from '#server/models/day-rate.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import { Lot } from '#server/models/lot.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { buildMember } from './build-member.ts';

export type DeskCaseWishes = {
  seller?: { id: string; actor: Actor };
  laboratory?: Laboratory | null;
  number?: string;
  issuedOn?: string;
  sampling?: 'laboratory' | 'whole_piece' | 'customer' | 'not_stated';
  gross?: string;
  itemMass?: string;
  itemMark?: string;
  itemDescription?: string;
  /** Permille on the lot, and on the report. */
  stated?: string;
  reported?: string;
  method?: string;
  documentHash?: string;
};

export type DeskCase = {
  id: string;
  lotId: string;
  code: string;
  sellerId: string;
  laboratory: Laboratory | null;
};

const randomHash = () => createHash('sha256').update(randomBytes(16)).digest('hex');

/** A laboratory of its own on the register. */
export async function buildLaboratory(
  wishes: Partial<{ validUntil: string; isActive: boolean }> = {},
): Promise<Laboratory> {
  const mark = randomBytes(4).toString('hex');
  return Laboratory.create({
    id: newId(),
    name: `Laboratory ${mark}`,
    accreditationBody: 'Accreditation of Harrow Vale',
    accreditationNumber: `HV-${mark}`,
    scope: 'Gold and silver by fire assay',
    region: 'Harrow Vale',
    contact: `desk-${mark}@laboratory.example`,
    validUntil: wishes.validUntil ?? '2099-12-31',
    isActive: wishes.isActive ?? true,
  });
}

/** A rate of gold, so that an opened lot can be ranked. */
async function giveGoldRate(): Promise<void> {
  if ((await DayRate.count({ where: { metal: 'Au' } })) > 0) return;
  const reading = {
    metal: 'Au' as const,
    mid: '2000.00',
    bid: null,
    ask: null,
    at: new Date(Date.now() - 5_000),
  };
  await withTransaction({}, (unit) => storeReading(reading, 'test', true, unit));
}

async function uploadDocument(ownerId: string, sha256: string): Promise<string> {
  const file = await StoredFile.create({
    id: newId(),
    ownerId,
    kind: 'certificate',
    sha256,
    mediaType: 'application/pdf',
    byteCount: 1234,
    originalName: 'report.pdf',
    storageKey: `certificates/test/${newId()}`,
  });
  return file.id;
}

function draftOf(wishes: DeskCaseWishes, fileId: string, laboratory: Laboratory | null) {
  const permille = (value: string) => ({ value, unit: 'permille' });
  const method = wishes.method ?? 'fire_assay';
  const stated = wishes.stated ?? '995.2';
  const content: DraftContent = {
    metal: 'Au',
    fineness: permille(stated),
    uncertainty: permille('0.5'),
    method,
    paidFor: true,
  };
  const result = {
    element: 'Au',
    fineness: permille(wishes.reported ?? stated),
    uncertainty: permille('0.5'),
    method,
  };
  return lotDraft.parse({
    form: 'button',
    title: 'Gold button from the bench',
    gross: { value: wishes.gross ?? '31.20', unit: 'g' },
    readability: { value: '0.01', unit: 'g' },
    contents: [content],
    price: '1900.00',
    shipping: '25.00',
    destinations: ['US'],
    certificate: {
      fileId,
      fileName: 'report.pdf',
      laboratoryId: laboratory?.id ?? null,
      laboratoryName: laboratory?.name ?? 'A laboratory nobody knows',
      number: wishes.number ?? `R-${randomBytes(4).toString('hex')}`,
      issuedOn: wishes.issuedOn ?? '2026-11-20',
      sampling: wishes.sampling ?? 'laboratory',
      itemDescription: wishes.itemDescription ?? 'One gold button',
      itemMass: { value: wishes.itemMass ?? '31.20', unit: wishes.itemMass === '' ? '' : 'g' },
      itemMark: wishes.itemMark ?? '',
      authorisedBy: 'P. Orsino',
      results: [result],
    },
    confirmsCautions: true,
    confirmsTitle: true,
  });
}

/** A lot with its certificate in the desk's queue, made through the commands. */
export async function buildDeskCase(wishes: DeskCaseWishes = {}): Promise<DeskCase> {
  const seller = wishes.seller ?? (await buildMember({ canSell: true }));
  const laboratory = wishes.laboratory === undefined ? await buildLaboratory() : wishes.laboratory;
  await giveGoldRate();
  const fileId = await uploadDocument(seller.id, wishes.documentHash ?? randomHash());
  const drafted = await withTransaction({}, (unit) => createDraft({}, unit, seller.actor));
  const draft = draftOf(wishes, fileId, laboratory);
  const lot = await withTransaction({ lots: [drafted.id] }, async (unit) => {
    const fresh = await Lot.findByPk(drafted.id, { rejectOnEmpty: true, transaction: unit.tx });
    await saveDraft({ lotId: drafted.id, draft, version: fresh.draftVersion }, unit, seller.actor);
    return submitLot({ lotId: drafted.id }, unit, seller.actor);
  });
  const certificate = await Certificate.findOne({ where: { lotId: lot.id }, rejectOnEmpty: true });
  return { id: certificate.id, lotId: lot.id, code: lot.code, sellerId: seller.id, laboratory };
}
