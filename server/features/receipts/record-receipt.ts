import type { z } from 'zod';
import { MeasureError } from '#shared/domain-error.ts';
import { canonicalGrams, massText, type MassEntry } from '#shared/mass.ts';
import type { receiptRequest } from '#shared/schemas/deals.ts';
import { InvalidError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import type { Deal } from '#server/models/deal.ts';
import { DealReceipt } from '#server/models/deal-receipt.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { compareWithLot } from './compare-with-lot.ts';
import { readDealToReceive } from './read-deal-to-receive.ts';

type ReceiptRequest = z.infer<typeof receiptRequest>;

function readMass(mass: ReceiptRequest['mass']): { entry: MassEntry; grams: string } {
  const entry = mass as MassEntry;
  try {
    return { entry, grams: canonicalGrams(entry, '/mass') };
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    throw new InvalidError(
      error.issues.map(({ code, field, message }) => ({ pointer: field, code, message })),
    );
  }
}

async function assertOwnPhoto(fileId: string | null, unit: Unit, actor: Actor): Promise<void> {
  if (fileId === null) return;
  const file = await StoredFile.findByPk(fileId, { transaction: unit.tx });
  const isOwn = file !== null && file.ownerId === actor.id && file.kind === 'receipt_photo';
  const uses = await DealReceipt.count({ where: { photoFileId: fileId }, transaction: unit.tx });
  if (isOwn && uses === 0) return;
  throw new InvalidError([
    { pointer: '/photoFileId', code: 'photo-unknown', message: 'Upload the photo again' },
  ]);
}

/**
 * The buyer's own weighing on receipt, once and as typed. It changes no sum: it is what acceptance or contest rest on.
 *
 * Locks the deal. Throws `not-found`, `forbidden`, `illegal-transition`, `invalid-input`.
 */
export async function recordReceipt(
  input: ReceiptRequest & { dealId: string },
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const deal = await readDealToReceive(input.dealId, unit, actor);
  const { entry, grams } = readMass(input.mass);
  await assertOwnPhoto(input.photoFileId, unit, actor);
  await DealReceipt.create(
    {
      id: newId(),
      dealId: deal.id,
      massValue: entry.value,
      massUnit: entry.unit,
      massGrams: grams,
      photoFileId: input.photoFileId,
      recordedAt: unit.now,
    },
    { transaction: unit.tx },
  );
  const comparison = deal.lot === undefined ? {} : compareWithLot(deal.lot, entry);
  return recordDealEvent(
    deal,
    {
      act: 'receipt-recorded',
      actorKind: 'buyer',
      actorId: actor.id,
      detail: { mass: massText(entry), ...comparison },
    },
    unit,
  );
}
