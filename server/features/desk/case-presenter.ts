import { dec, plain } from '#shared/decimal.ts';
import type { CaseAnswer, QueueRow } from '#shared/schemas/desk.ts';
import { z } from 'zod';
import { registerEntryOf } from '#server/features/laboratories/laboratory-queries.ts';
import { photoAnswerOf } from '#server/features/photos/photo-answer.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { LotEvent } from '#server/models/lot-event.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { gradeCase, massesOf } from './case-evidence.ts';
import type { flagCase } from './case-flags.ts';
import { type CaseFlag } from './case-flags.ts';
import { canOnCase, canPull } from './case-policy.ts';
import type { LoadedCase } from './case-queries.ts';
import { claimsBeyondReport, compareReport } from './compare-report.ts';
import { nameOfElement } from './element-words.ts';
import { EVIDENCE_GAP_LABELS, type EvidenceGrade } from '#shared/assay/evidence.ts';
import { canSuspend } from './member-policy.ts';

const trimmed = (value: string) => plain(dec(value));

/** What else the report says; written at submission, read with care. */
const reportFields = z
  .object({
    receivedOn: z.string().nullish(),
    testedOn: z.string().nullish(),
    itemDescription: z.string().nullish(),
    authorisedBy: z.string().nullish(),
  })
  .catch({});

export function presentQueueRow(
  { certificate, lot }: LoadedCase,
  context: { actor: Actor; names: ReadonlyMap<string, string>; flags: readonly CaseFlag[] },
): QueueRow {
  const { actor, names, flags } = context;
  return {
    id: certificate.id,
    lotCode: lot.code,
    lotTitle: lot.title ?? '',
    form: lot.form ?? '',
    laboratoryName: certificate.laboratoryName,
    number: certificate.number,
    submittedAt: certificate.submittedAt.toISOString(),
    state: certificate.state,
    claimedBy: certificate.claimedById === null ? null : (names.get(certificate.claimedById) ?? null),
    isMine: certificate.claimedById === actor.id,
    flags: flags.length,
    can: {
      claim: canOnCase(actor, 'claim', { certificate, lot }),
      open: canOnCase(actor, 'open', { certificate, lot }),
    },
  };
}

const WHO: Readonly<Record<LotEvent['actorKind'], string>> = {
  seller: 'the seller',
  buyer: 'a buyer',
  desk: 'the desk',
  house: 'the house',
};

function presentEvent(event: LotEvent): CaseAnswer['lot']['history'][number] {
  const said = z.object({ reason: z.string().optional() }).catch({}).parse(event.detail);
  return {
    at: event.at.toISOString(),
    act: event.act,
    who: WHO[event.actorKind],
    note: said.reason ?? null,
  };
}

function presentReport(each: LoadedCase): CaseAnswer['report'] {
  const { certificate, lot, laboratory, results } = each;
  const fields = reportFields.parse(certificate.reportFields);
  return {
    laboratoryName: certificate.laboratoryName,
    laboratory: laboratory === null ? null : registerEntryOf(laboratory),
    number: certificate.number,
    issuedOn: certificate.issuedOn,
    receivedOn: fields.receivedOn || null,
    testedOn: fields.testedOn || null,
    sampling: certificate.sampling,
    itemDescription: fields.itemDescription ?? '',
    itemMass: massesOf(certificate, lot).report,
    itemMark: certificate.itemMark,
    authorisedBy: fields.authorisedBy ?? '',
    results: results.map((result) => ({
      element: result.element,
      finenessPermille: trimmed(result.finenessPermille),
      uncertaintyPermille: result.uncertaintyPermille === null ? null : trimmed(result.uncertaintyPermille),
      method: result.method,
    })),
  };
}

function presentLot(
  { certificate, lot, assays, photos }: LoadedCase,
  events: readonly LotEvent[],
): CaseAnswer['lot'] {
  return {
    code: lot.code,
    title: lot.title ?? '',
    description: lot.description ?? '',
    form: lot.form ?? '',
    gross: massesOf(certificate, lot).lot,
    contents: assays.map((assay) => ({
      element: assay.element,
      fineness: { value: trimmed(assay.finenessValue), unit: assay.finenessUnit },
      finenessPermille: trimmed(assay.finenessPermille),
      uncertaintyPermille: trimmed(assay.uncertaintyPermille),
      isUncertaintyAssumed: assay.isUncertaintyAssumed,
      method: assay.method,
      isPaidFor: assay.isPaidFor,
    })),
    photos: photos.map(photoAnswerOf),
    history: events.map(presentEvent),
    state: lot.state,
  };
}

function presentDecision(
  certificate: Certificate,
  names: ReadonlyMap<string, string>,
): CaseAnswer['decision'] {
  if (certificate.decidedAt === null || certificate.decidedById === null) return null;
  return {
    by: names.get(certificate.decidedById) ?? 'the desk',
    at: certificate.decidedAt.toISOString(),
    grade: certificate.grade,
    confirmedHow: certificate.confirmedHow,
    confirmedWith: certificate.confirmedWith,
    confirmedOn: certificate.confirmedOn,
    returnReason: certificate.returnReason,
  };
}

/** What verification would come to, and what stands in its way. */
function proposalOf({ certificate, lot, laboratory, results, assays }: LoadedCase): {
  grade: EvidenceGrade;
  gaps: string[];
} {
  const graded = gradeCase({ certificate, lot, laboratory, desk: 'verified', isMarkSeen: false });
  const gaps = graded.gaps.map((gap) => EVIDENCE_GAP_LABELS[gap]);
  const claims = claimsBeyondReport({ results, contents: assays }).map(nameOfElement);
  if (claims.length === 0) return { grade: graded.grade, gaps };
  gaps.push(`The lot claims more than the report gives (${claims.join(', ')}): verification is refused.`);
  return { grade: 'examined', gaps };
}

export type CaseContext = {
  actor: Actor;
  names: ReadonlyMap<string, string>;
  events: readonly LotEvent[];
  completedDeals: number;
  flags: ReturnType<typeof flagCase>;
};

/** A case as one of the desk sees it: document, report, lot, what differs and what was noticed. */
export function presentCase(each: LoadedCase, context: CaseContext): CaseAnswer {
  const { certificate, lot, seller, file, assays } = each;
  const { actor, names, events, completedDeals, flags } = context;
  const report = presentReport(each);
  const shown = presentLot(each, events);
  const masses = massesOf(certificate, lot);
  const proposal = proposalOf(each);
  const may = (act: Parameters<typeof canOnCase>[1]) => canOnCase(actor, act, { certificate, lot });
  return {
    id: certificate.id,
    version: certificate.lockVersion,
    state: certificate.state,
    claimedBy: certificate.claimedById === null ? null : (names.get(certificate.claimedById) ?? null),
    submittedAt: certificate.submittedAt.toISOString(),
    document: {
      url: `/api/v1/certificates/${certificate.id}/document`,
      mediaType: file.mediaType,
      name: file.originalName,
    },
    report,
    lot: shown,
    seller: {
      id: seller.id,
      displayName: seller.displayName,
      region: seller.region,
      completedDeals,
      suspendedAt: seller.suspendedAt?.toISOString() ?? null,
    },
    comparison: compareReport({
      form: shown.form,
      itemDescription: report.itemDescription,
      reportMass: masses.report,
      lotMass: masses.lot,
      itemMark: certificate.itemMark,
      results: report.results,
      contents: assays,
    }),
    flags: [...flags],
    proposedGrade: proposal.grade,
    gaps: proposal.gaps,
    decision: presentDecision(certificate, names),
    can: {
      claim: may('claim'),
      release: may('release'),
      verify: may('verify'),
      examine: may('examine'),
      return: may('return'),
      pull: canPull(actor, lot),
      suspend: canSuspend(actor, seller),
    },
  };
}
