import { fixed } from '#shared/decimal.ts';
import { fractionToPermille, toPermille } from '#shared/fineness.ts';
import type { ParsedCertificate } from '#shared/lot-certificate.ts';
import type { ParsedLot } from '#shared/lot-submission.ts';
import { canonicalGrams } from '#shared/mass.ts';
import { measureLot } from '#shared/settlement/lot-measures.ts';
import { COVERAGE_FACTOR } from '#shared/uncertainty.ts';
import { invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Certificate } from '#server/models/certificate.ts';
import { CertificateResult } from '#server/models/certificate-result.ts';
import type { Laboratory } from '#server/models/laboratory.ts';
import type { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import type { StoredFile } from '#server/models/stored-file.ts';

/** Digits after the dot of a stored fraction in ‰: karat does not end. */
const PERMILLE_DECIMALS = 12;
const LIVE_KEY_LENGTH_MAX = 200;

/** Writes the assay of the lot's present version, each row with what was typed and what it comes to. */
export async function writeAssays(lot: Lot, parsed: ParsedLot, unit: Unit): Promise<void> {
  const { contents } = measureLot(parsed);
  const rows = parsed.contents.map((content, position) => {
    const measured = contents[position];
    invariant(measured !== undefined, 'every row of an assay is measured');
    return {
      id: newId(),
      lotId: lot.id,
      assayVersion: lot.assayVersion,
      position,
      element: content.metal,
      finenessValue: content.fineness.value,
      finenessUnit: content.fineness.unit,
      finenessPermille: fixed(fractionToPermille(measured.fraction), PERMILLE_DECIMALS),
      uncertaintyValue: content.uncertainty?.value ?? null,
      uncertaintyUnit: content.uncertainty?.unit ?? null,
      uncertaintyPermille: fixed(
        measured.standardUncertainty.times(COVERAGE_FACTOR).times(1000),
        PERMILLE_DECIMALS,
      ),
      isUncertaintyAssumed: content.uncertainty === null,
      method: content.method,
      isPaidFor: content.paidFor,
    };
  });
  await LotAssay.bulkCreate(rows, { transaction: unit.tx });
}

/** Laboratory and report number without the ways of writing them that mean nothing: case, blanks, punctuation. */
export function liveKeyOf(laboratoryName: string, number: string): string {
  const tidy = (text: string) =>
    text
      .normalize('NFKC')
      .toUpperCase()
      .replace(/[^\p{L}\p{N}]+/gu, '');
  return `${tidy(laboratoryName)}|${tidy(number)}`.slice(0, LIVE_KEY_LENGTH_MAX);
}

/** Writes the certificate of the lot's present version with its results, live at once. */
export async function writeCertificate(
  lot: Lot,
  parsed: ParsedCertificate,
  { file, laboratory }: { file: StoredFile; laboratory: Laboratory | null },
  unit: Unit,
): Promise<Certificate> {
  const { itemMass } = parsed;
  const laboratoryName = laboratory?.name ?? parsed.laboratoryName;
  const certificate = await Certificate.create(
    {
      id: newId(),
      lotId: lot.id,
      assayVersion: lot.assayVersion,
      state: 'submitted',
      fileId: file.id,
      laboratoryId: laboratory?.id ?? null,
      laboratoryName,
      number: parsed.number,
      issuedOn: parsed.issuedOn,
      sampling: parsed.sampling,
      itemMassValue: itemMass?.value ?? null,
      itemMassUnit: itemMass?.unit ?? null,
      itemMassGrams: itemMass === null ? null : canonicalGrams(itemMass, '/certificate/itemMass'),
      itemMark: parsed.itemMark,
      reportFields: {
        receivedOn: parsed.receivedOn,
        testedOn: parsed.testedOn,
        itemDescription: parsed.itemDescription,
        authorisedBy: parsed.authorisedBy,
      },
      sha256: file.sha256,
      liveKey: liveKeyOf(laboratoryName, parsed.number),
      submittedAt: unit.now,
    },
    { transaction: unit.tx },
  );
  await CertificateResult.bulkCreate(
    parsed.results.map((result, position) => ({
      id: newId(),
      certificateId: certificate.id,
      position,
      element: result.element,
      finenessPermille: fixed(toPermille(result.fineness), PERMILLE_DECIMALS),
      uncertaintyPermille:
        result.uncertainty === null ? null : fixed(toPermille(result.uncertainty), PERMILLE_DECIMALS),
      method: result.method,
    })),
    { transaction: unit.tx },
  );
  return certificate;
}
