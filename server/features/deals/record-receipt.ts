import type { z } from 'zod';
import { MeasureError } from '#shared/domain-error.ts';
import { canonicalGrams, massText, type MassEntry } from '#shared/mass.ts';
import type { receiptRequest } from '#shared/schemas/deals.ts';
import { ConflictError, InvalidError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import { DealReceipt } from '#server/models/deal-receipt.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { recordDealEvent } from './move-deal.ts';
import { assertState, readDealFor } from './read-own-deal.ts';
import { compareReceivedMass } from './received-mass.ts';

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
  if (file !== null && file.ownerId === actor.id) return;
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
  const deal = await readDealFor('buyer', input.dealId, unit, actor);
  assertState(
    deal,
    ['delivered'],
    'The mass is recorded after the delivery and before accepting or contesting.',
  );
  if ((deal.receipt ?? null) !== null)
    throw new ConflictError('illegal-transition', 'The received mass is recorded already.');
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
  const comparison = deal.lot === undefined ? {} : compareReceivedMass(deal.lot, entry);
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
