import { ConflictError, ForbiddenError, NotFoundError, invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Certificate } from '#server/models/certificate.ts';
import { CertificateResult } from '#server/models/certificate-result.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { isOwnCase } from './case-policy.ts';

export type LockedCase = { certificate: Certificate; lot: Lot };

/** Reads a certificate and its lot for a change. The caller holds the lot's guard row. Throws `not-found`, `own-case`. */
export async function lockCase(id: string, unit: Unit, actor: Actor): Promise<LockedCase> {
  const certificate = await Certificate.findByPk(id, { transaction: unit.tx, lock: unit.tx.LOCK.UPDATE });
  if (certificate === null) throw new NotFoundError();
  const lot = await Lot.findByPk(certificate.lotId, { transaction: unit.tx });
  invariant(lot !== null, 'a certificate belongs to a lot');
  if (isOwnCase(actor, lot)) throw new ForbiddenError('own-case');
  return { certificate, lot };
}

/**
 * As `lockCase`, for a decision: the actor holds the claim and decides on what he saw.
 *
 * Throws also `illegal-transition` (decided already, or the lot waits no longer), `certificate-not-claimed`,
 * `certificate-claimed` (by a colleague), `version-conflict`.
 */
export async function lockClaimedCase(
  { id, version }: { id: string; version: number },
  unit: Unit,
  actor: Actor,
): Promise<LockedCase> {
  const { certificate, lot } = await lockCase(id, unit, actor);
  if (certificate.state === 'submitted' || certificate.state === 'examined')
    throw new ConflictError('certificate-not-claimed');
  if (certificate.state !== 'claimed' || lot.state !== 'submitted')
    throw new ConflictError('illegal-transition', 'This certificate waits for no decision any more.');
  if (certificate.claimedById !== actor.id) throw new ConflictError('certificate-claimed');
  if (certificate.lockVersion !== version) throw new ConflictError('version-conflict');
  return { certificate, lot };
}

/** What the report and the lot state, for the version of the assay that the certificate was handed in with. */
export async function figuresOf(
  certificate: Certificate,
  unit: Unit,
): Promise<{ results: CertificateResult[]; contents: LotAssay[] }> {
  const { lotId, assayVersion, id } = certificate;
  const results = await CertificateResult.findAll({ where: { certificateId: id }, transaction: unit.tx });
  const contents = await LotAssay.findAll({ where: { lotId, assayVersion }, transaction: unit.tx });
  return { results, contents };
}
