import { gradeEvidence, type DeskFinding, type Evidence } from '#shared/assay/evidence.ts';
import { dec, plain } from '#shared/decimal.ts';
import { isMassUnit, type MassEntry } from '#shared/mass.ts';
import { lotDraft } from '#shared/schemas/lots.ts';
import { invariant } from '#server/app-error.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Laboratory } from '#server/models/laboratory.ts';
import type { Lot } from '#server/models/lot.ts';

const PLAIN_DECIMAL = /^\d+(\.\d+)?$/;

/**
 * The digits as they were typed, where the draft still holds them: `12.30` claims a hundredth, `12.3` a tenth, and the
 * stored column has lost the difference.
 */
function asTyped(stored: string, typed: string): string {
  const text = typed.trim().replace(',', '.');
  return PLAIN_DECIMAL.test(text) && dec(text).eq(stored) ? text : plain(dec(stored));
}

function massEntry(value: string | null, unit: string | null, typed: string): MassEntry | null {
  if (value === null || unit === null) return null;
  invariant(isMassUnit(unit), 'a stored mass has a known unit');
  return { value: asTyped(value, typed), unit };
}

/** The two masses that are compared: on the report, if it names one, and the lot's. */
export function massesOf(certificate: Certificate, lot: Lot): { report: MassEntry | null; lot: MassEntry } {
  const draft = lotDraft.safeParse(lot.draft).data;
  const gross = massEntry(lot.grossValue, lot.grossUnit, draft?.gross.value ?? '');
  invariant(gross !== null, 'a submitted lot has its gross mass');
  const onReport = draft?.certificate.itemMass.value ?? '';
  return { report: massEntry(certificate.itemMassValue, certificate.itemMassUnit, onReport), lot: gross };
}

export type EvidenceInput = {
  certificate: Certificate;
  lot: Lot;
  laboratory: Laboratory | null;
  desk: DeskFinding;
  /** The desk says that the mark on the report is seen on the lot's photos. */
  isMarkSeen: boolean;
};

function evidenceOf({ certificate, lot, laboratory, desk, isMarkSeen }: EvidenceInput): Evidence {
  const masses = massesOf(certificate, lot);
  const isRegistered = laboratory !== null && laboratory.isActive;
  return {
    desk,
    report: {
      laboratory: isRegistered ? { accreditedFrom: null, accreditedUntil: laboratory.validUntil } : null,
      issuedOn: certificate.issuedOn,
      sampling: certificate.sampling,
      mass: masses.report,
      mark: certificate.itemMark,
    },
    lot: { gross: masses.lot, mark: isMarkSeen ? certificate.itemMark : null },
  };
}

/** The grade that follows from the report, the lot and what the desk did, by the one rule of the engine. */
export function gradeCase(input: EvidenceInput): ReturnType<typeof gradeEvidence> {
  return gradeEvidence(evidenceOf(input));
}
