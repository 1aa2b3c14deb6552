import { ForbiddenError, invariant, NotFoundError } from '#server/app-error.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Lot } from '#server/models/lot.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canReadDocument, canSeeLot } from './lot-policy.ts';
import { findOwnDeal } from './lot-queries.ts';

/** The document of a certificate that the viewer may read. Throws `not-found`, `forbidden`. */
export async function findReadableDocument(certificateId: string, viewer: Actor): Promise<StoredFile> {
  const certificate = await Certificate.findByPk(certificateId, {
    include: [
      { model: Lot, as: 'lot' },
      { model: StoredFile, as: 'file' },
    ],
  });
  if (certificate === null) throw new NotFoundError();
  const { lot, file } = certificate;
  invariant(lot !== undefined && file !== undefined, 'a certificate has its lot and its document');
  const deal = await findOwnDeal(lot.id, viewer);
  if (canReadDocument(viewer, lot, deal)) return file;
  const isBuyer = deal !== null && deal.buyerId === viewer.id;
  throw canSeeLot(viewer, lot, isBuyer) ? new ForbiddenError() : new NotFoundError();
}
