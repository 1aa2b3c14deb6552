import { dec, plain } from '#shared/decimal.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canReadDocument } from './lot-policy.ts';

export function documentUrl(certificateId: string): string {
  return `/api/v1/certificates/${certificateId}/document`;
}

/** What was done, in words that claim no more than that. */
function deskNoteOf(certificate: Certificate): string {
  switch (certificate.state) {
    case 'verified':
      return 'Compared and confirmed by the desk; the metal was not tested by Scruple.';
    case 'examined':
      return 'Looked at by the desk; the metal was not tested by Scruple.';
    case 'returned':
      return 'Returned to the seller by the desk.';
    case 'superseded':
      return 'Replaced or taken back by the seller.';
    default:
      return 'With the desk; nothing has been confirmed yet.';
  }
}

type PublicCertificate = NonNullable<LotAnswer['certificate']>;

function presentResults(certificate: Certificate): PublicCertificate['results'] {
  return [...(certificate.results ?? [])]
    .sort((left, right) => left.position - right.position)
    .map((result) => ({
      element: result.element,
      finenessPermille: plain(dec(result.finenessPermille)),
      uncertaintyPermille:
        result.uncertaintyPermille === null ? null : plain(dec(result.uncertaintyPermille)),
      method: result.method,
    }));
}

export function presentCertificate(
  certificate: Certificate,
  lot: Lot,
  deal: Deal | null,
  viewer: Actor | null,
): PublicCertificate {
  const { laboratory, itemMassValue, itemMassUnit } = certificate;
  return {
    laboratoryName: certificate.laboratoryName,
    accreditation:
      laboratory === undefined || laboratory === null
        ? null
        : `${laboratory.accreditationBody} ${laboratory.accreditationNumber}`,
    number: certificate.number,
    issuedOn: certificate.issuedOn,
    sampling: certificate.sampling,
    itemMass:
      itemMassValue === null || itemMassUnit === null ? null : { value: itemMassValue, unit: itemMassUnit },
    itemMark: certificate.itemMark,
    results: presentResults(certificate),
    state: certificate.state,
    deskNote: deskNoteOf(certificate),
    decidedAt: certificate.decidedAt?.toISOString() ?? null,
    documentUrl: canReadDocument(viewer, lot, deal) ? documentUrl(certificate.id) : null,
  };
}
