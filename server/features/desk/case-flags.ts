import type { z } from 'zod';
import { ASSAY_METHODS, isAssayMethodKey, isOutsideRange } from '#shared/assay/methods.ts';
import { dec, plain, type Dec } from '#shared/decimal.ts';
import { isMetal } from '#shared/metals.ts';
import type { caseFlag } from '#shared/schemas/desk.ts';
import type { LoadedCase } from './case-queries.ts';
import { nameOfElement } from './element-words.ts';
import { foldNumber, type FlagSources, type Sighting } from './flag-sources.ts';

export type CaseFlag = z.infer<typeof caseFlag>;

function flag(code: CaseFlag['code'], message: string, lotCode: string | null = null): CaseFlag {
  return { code, message, lotCode };
}

function elsewhere<Row extends Sighting>(rows: readonly Row[] | undefined, lotId: string): Row[] {
  const seen = new Map((rows ?? []).filter((row) => row.lotId !== lotId).map((row) => [row.lotId, row]));
  return [...seen.values()];
}

function sightingFlags({ certificate, photos }: LoadedCase, sources: FlagSources): CaseFlag[] {
  const { lotId } = certificate;
  const sameLaboratory = (row: { laboratoryId: string | null; laboratoryName: string }) =>
    (row.laboratoryId !== null && row.laboratoryId === certificate.laboratoryId) ||
    foldNumber(row.laboratoryName) === foldNumber(certificate.laboratoryName);
  const numbers = elsewhere(
    sources.reportsByNumber.get(foldNumber(certificate.number))?.filter(sameLaboratory),
    lotId,
  );
  const documents = elsewhere(sources.documentsByHash.get(certificate.sha256), lotId);
  const pictures = elsewhere(
    photos.flatMap((photo) => sources.photosByHash.get(photo.file!.sha256) ?? []),
    lotId,
  );
  return [
    ...numbers.map((row) =>
      flag('number-seen-before', 'This laboratory’s report number was given for another lot.', row.lotCode),
    ),
    ...documents.map((row) =>
      flag('file-seen-before', 'The same file was handed in for another lot.', row.lotCode),
    ),
    ...pictures.map((row) => flag('photo-seen-before', 'A photo stands with another lot too.', row.lotCode)),
  ];
}

function laboratoryFlags({ certificate, laboratory }: LoadedCase, today: string): CaseFlag[] {
  const flags: CaseFlag[] = [];
  if (laboratory === null) {
    flags.push(flag('laboratory-unknown', `“${certificate.laboratoryName}” is not on our register.`));
  } else if (!laboratory.isActive) {
    flags.push(flag('laboratory-unknown', `${laboratory.name} is no longer active on our register.`));
  } else if (certificate.issuedOn > laboratory.validUntil) {
    const message = `Issued on ${certificate.issuedOn}; the accreditation ended on ${laboratory.validUntil}.`;
    flags.push(flag('accreditation-expired', message));
  }
  if (certificate.issuedOn > today)
    flags.push(flag('issued-in-future', `The date of issue, ${certificate.issuedOn}, has not come yet.`));
  return flags;
}

function pieceFlags({ certificate }: LoadedCase): CaseFlag[] {
  const flags: CaseFlag[] = [];
  if (certificate.sampling === 'customer')
    flags.push(
      flag('not-sampled-by-laboratory', 'The customer took the sample; the piece itself was not seen.'),
    );
  if (certificate.sampling === 'not_stated')
    flags.push(flag('not-sampled-by-laboratory', 'The report does not say who took the sample.'));
  if (certificate.itemMassGrams === null && certificate.itemMark === null)
    flags.push(flag('no-mass-nor-mark', 'The report names neither a mass nor a mark of the piece.'));
  return flags;
}

function sumOf(rows: readonly { finenessPermille: string }[]): Dec {
  return rows.reduce((sum, row) => sum.plus(row.finenessPermille), dec('0'));
}

function figureFlags({ results, assays }: LoadedCase): CaseFlag[] {
  const flags: CaseFlag[] = [];
  for (const [whose, rows] of [
    ['The report’s', results],
    ['The lot’s', assays],
  ] as const) {
    const sum = sumOf(rows);
    if (sum.gt('1000'))
      flags.push(flag('fractions-over-whole', `${whose} fractions add up to ${plain(sum)} ‰.`));
  }
  for (const { element, finenessPermille, method } of results) {
    if (!isAssayMethodKey(method)) continue;
    const { name, isSurfaceOnly } = ASSAY_METHODS[method];
    const fineness = dec(finenessPermille);
    if (isMetal(element) && isOutsideRange(method, element, fineness)) {
      const what = `${nameOfElement(element)} at ${plain(fineness)} ‰`;
      flags.push(flag('outside-method-range', `${name} is not for ${what.toLowerCase()}.`));
    }
    if (isSurfaceOnly)
      flags.push(flag('method-surface-only', `${nameOfElement(element)}: ${name} sees the surface only.`));
  }
  return flags;
}

/** What the desk must not miss. `today` is an ISO calendar day. Flags stand beside the figures and decide nothing. */
export function flagCase(each: LoadedCase, sources: FlagSources, today: string): CaseFlag[] {
  return [
    ...sightingFlags(each, sources),
    ...laboratoryFlags(each, today),
    ...pieceFlags(each),
    ...figureFlags(each),
  ];
}
