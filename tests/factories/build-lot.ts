import { randomBytes } from 'node:crypto';
import { dayOf, daysLater } from '#shared/calendar-day.ts';
import type { Metal } from '#shared/metals.ts';
import { lotDraft, type LotDraft } from '#shared/schemas/lots.ts';
import { databaseNow, withTransaction, type Unit } from '#server/database/transaction.ts';
import { changePrice } from '#server/features/lots/change-price.ts';
import { createDraft } from '#server/features/lots/create-draft.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { openLot } from '#server/features/lots/open-lot.ts';
import { pauseLot } from '#server/features/lots/pause-lot.ts';
import { saveDraft } from '#server/features/drafting/save-draft.ts';
import { submitLot } from '#server/features/drafting/submit-lot.ts';
import { withdrawLot } from '#server/features/lots/withdraw-lot.ts';
import { uploadCertificate } from '#server/features/lot-documents/upload-certificate.ts';
import { actorOf, findMember } from '#server/features/members/member-queries.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { DayRate } from '#server/models/day-rate.ts';
import { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { buildMember } from './build-member.ts';

export type BuiltLotState = 'draft' | 'submitted' | 'returned' | 'open' | 'paused' | 'withdrawn' | 'closed';
export type BuiltLot = { id: string; code: string; sellerId: string; seller: Actor; draft: LotDraft };

type Wishes = {
  state?: BuiltLotState;
  /** Someone who can sell; without it the lot brings its own seller. */
  sellerId?: string;
  metal?: Metal;
  permille?: string;
  gross?: string;
  price?: string;
  /** Laid over the draft as a whole. */
  draft?: Partial<LotDraft>;
};

export const LOT_RATES: Readonly<Record<Metal, string>> = {
  Au: '4182.40',
  Ag: '51.125',
  Pt: '1604.00',
  Pd: '1392.50',
};

/** A first rate of each metal, so that a lot can be ranked. */
export async function buildRates(): Promise<void> {
  const now = await databaseNow();
  for (const [metal, mid] of Object.entries(LOT_RATES) as [Metal, string][]) {
    if ((await DayRate.count({ where: { metal } })) > 0) continue;
    const reading = { metal, mid, bid: null, ask: null, at: now };
    await withTransaction({}, (unit) => storeReading(reading, 'test', true, unit));
  }
}

/** A PDF that is one by its first bytes, different every time. */
export function pdfBytes(mark = randomBytes(8).toString('hex')): Buffer {
  return Buffer.from(`%PDF-1.4\n% ${mark}\n1 0 obj<</Type/Catalog>>endobj\ntrailer<</Root 1 0 R>>\n%%EOF\n`);
}

/** A draft that can be submitted once a certificate's document is uploaded. */
export function completeDraft(now: Date, wishes: Omit<Wishes, 'state' | 'sellerId'> = {}): LotDraft {
  const { metal = 'Au', permille = '995.2', gross = '31.20' } = wishes;
  const fineness = { value: permille, unit: 'permille' };
  const uncertainty = { value: '0.5', unit: 'permille' };
  const main = { metal, fineness, uncertainty, method: 'fire_assay', paidFor: true };
  const contents = wishes.draft?.contents ?? [main];
  // The report gives every metal that the lot is paid for.
  const results = contents
    .filter(({ paidFor }) => paidFor)
    .map(({ metal: element, paidFor: _, ...result }) => ({ element, ...result }));
  return lotDraft.parse({
    form: 'button',
    title: 'Button from the bench',
    description: 'Melted once, poured, one sample drilled.',
    gross: { value: gross, unit: 'g' },
    readability: { value: '0.01', unit: 'g' },
    contents,
    price: wishes.price ?? '1900.00',
    shipping: '25.00',
    destinations: ['US', 'CA'],
    certificate: {
      laboratoryName: 'Tarn Assay House',
      number: `TA-${randomBytes(5).toString('hex')}`,
      issuedOn: dayOf(daysLater(now, -10)),
      sampling: 'laboratory',
      itemMass: { value: gross, unit: 'g' },
      results,
    },
    confirmsCautions: true,
    confirmsTitle: true,
    ...wishes.draft,
  });
}

async function sellerOf(sellerId: string | undefined): Promise<Actor> {
  if (sellerId === undefined) return (await buildMember({ canSell: true })).actor;
  const member = await findMember(sellerId);
  if (member === null) throw new Error('There is no such seller');
  return actorOf(member);
}

async function fillDraft(lot: Lot, draft: LotDraft, seller: Actor): Promise<LotDraft> {
  const file = await uploadCertificate(lot.id, { name: 'report.pdf', content: pdfBytes() }, seller);
  const certificate = { ...draft.certificate, fileId: file.fileId, fileName: file.fileName };
  const filled = { ...draft, certificate };
  await withTransaction({ lots: [lot.id] }, (unit) =>
    saveDraft({ lotId: lot.id, draft: filled, version: lot.draftVersion }, unit, seller),
  );
  return filled;
}

const DESK = { id: '00000000-0000-7000-8000-0000000000de' };

async function openIt(lotId: string): Promise<void> {
  await buildRates();
  await withTransaction({ lots: [lotId] }, async (unit) => {
    const lot = await Lot.findByPk(lotId, { transaction: unit.tx, rejectOnEmpty: true });
    await openLot({ lot, grade: 'certified' }, unit, DESK);
  });
}

async function returnIt(lotId: string): Promise<void> {
  await withTransaction({ lots: [lotId] }, async (unit) => {
    const lot = await Lot.findByPk(lotId, { transaction: unit.tx, rejectOnEmpty: true });
    const reason = 'The mass on the report is not the mass of the lot.';
    const changes = { stateReason: reason };
    const act = {
      act: 'returned',
      actorKind: 'desk',
      actorId: DESK.id,
      detail: { reason },
      changes,
    } as const;
    await moveLot(lot, 'returned', act, unit);
  });
}

async function closeIt(lotId: string): Promise<void> {
  await withTransaction({ lots: [lotId] }, async (unit) => {
    const lot = await Lot.findByPk(lotId, { transaction: unit.tx, rejectOnEmpty: true });
    await moveLot(lot, 'closed', { act: 'closed', actorKind: 'house' }, unit);
  });
}

/** A lot with its own seller and certificate, brought to the state by the product's own commands. */
export async function buildLot(wishes: Wishes = {}): Promise<BuiltLot> {
  const { state = 'open' } = wishes;
  const seller = await sellerOf(wishes.sellerId);
  const lot = await withTransaction({}, (unit) => createDraft({}, unit, seller));
  const lotId = lot.id;
  const draft = await fillDraft(lot, completeDraft(await databaseNow(), wishes), seller);
  const inLot = (work: (unit: Unit) => Promise<unknown>) => withTransaction({ lots: [lotId] }, work);
  if (state !== 'draft') await inLot((unit) => submitLot({ lotId }, unit, seller));
  if (state === 'returned') await returnIt(lotId);
  if (state === 'open' || state === 'paused' || state === 'closed' || state === 'withdrawn')
    await openIt(lotId);
  if (state === 'paused') await inLot((unit) => pauseLot({ lotId }, unit, seller));
  if (state === 'closed') await closeIt(lotId);
  if (state === 'withdrawn') {
    await inLot((unit) => withdrawLot({ lotId, reason: 'Sold elsewhere.' }, unit, seller));
  }
  return { id: lotId, code: lot.code, sellerId: seller.id, seller, draft };
}

/** Sets the price of an open lot as its seller does. */
export async function repriceLot({ id, seller }: BuiltLot, price: string): Promise<void> {
  await withTransaction({ lots: [id] }, (unit) => changePrice({ lotId: id, price }, unit, seller));
}
