import { UniqueConstraintError } from 'sequelize';
import { endOfDay } from '#shared/calendar-day.ts';
import { canonicalGrams } from '#shared/mass.ts';
import { checkLotDraft, type LotProblem, type ParsedLot } from '#shared/lot-submission.ts';
import { lotDraft } from '#shared/schemas/lots.ts';
import { AppError, ConflictError, invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { RULES_VERSION } from '#shared/rules.ts';
import { canSell } from '#server/features/members/member-queries.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import type { Lot } from '#server/models/lot.ts';
import { Member } from '#server/models/member.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';
import { writeAssays, writeCertificate } from './write-evidence.ts';

async function readSeller(unit: Unit, actor: Actor): Promise<Member> {
  const member = await Member.findByPk(actor.id, {
    include: [{ model: PayoutAccount, as: 'payoutAccount' }],
    transaction: unit.tx,
  });
  invariant(member !== null, 'whoever is signed in is a member');
  if (member.suspendedAt !== null) throw new AppError('member-suspended');
  if (!canSell(member)) throw new ConflictError('payout-onboarding-required');
  return member;
}

type Backing = { file: StoredFile; laboratory: Laboratory | null };

/** What only the database knows: that the document is there and the seller's, and that the laboratory is registered. */
async function readBacking(
  lot: Lot,
  draft: ReturnType<typeof lotDraft.parse>,
  unit: Unit,
): Promise<{ backing: Backing | null; problems: LotProblem[] }> {
  const { fileId, laboratoryId } = draft.certificate;
  const problems: LotProblem[] = [];
  const file = fileId === null ? null : await StoredFile.findByPk(fileId, { transaction: unit.tx });
  const isDocument = file !== null && file.kind === 'certificate' && file.ownerId === lot.sellerId;
  if (fileId !== null && !isDocument) {
    const message = 'The document is no longer there; upload it again.';
    problems.push({ pointer: '/certificate/fileId', code: 'file-missing', message });
  }
  const laboratory =
    laboratoryId === null ? null : await Laboratory.findByPk(laboratoryId, { transaction: unit.tx });
  if (laboratoryId !== null && laboratory === null) {
    const message = 'This laboratory is not on the register; write its name.';
    problems.push({ pointer: '/certificate/laboratoryId', code: 'laboratory-unknown', message });
  }
  return { backing: isDocument ? { file, laboratory } : null, problems };
}

/** Reads the draft against every rule at once. Throws `lot-not-complete` with a pointer for each problem. */
async function readComplete(lot: Lot, unit: Unit): Promise<{ parsed: ParsedLot; backing: Backing }> {
  const draft = lotDraft.parse(lot.draft);
  const { problems, value } = checkLotDraft(draft, unit.now);
  const { backing, problems: missing } = await readBacking(lot, draft, unit);
  const all = [...problems, ...missing];
  if (all.length > 0 || value === null || backing === null) {
    throw new AppError('lot-not-complete', undefined, all);
  }
  return { parsed: value, backing };
}

function columnsOf(parsed: ParsedLot, lot: Lot, region: string, unit: Unit): Parameters<Lot['update']>[0] {
  return {
    form: parsed.form,
    title: parsed.title,
    description: parsed.description,
    region,
    grossValue: parsed.gross.value,
    grossUnit: parsed.gross.unit,
    grossGrams: canonicalGrams(parsed.gross, '/gross'),
    readabilityValue: parsed.readability?.value ?? null,
    readabilityUnit: parsed.readability?.unit ?? null,
    pricingBasis: parsed.pricingBasis,
    settlesOn: 'stated',
    priceMinor: parsed.priceMinor,
    linkedPercent: parsed.linkedPercent,
    floorPercent: parsed.floorPercent,
    shippingMinor: parsed.shippingMinor,
    destinations: parsed.destinations,
    evidenceGrade: 'declared',
    assayVersion: lot.assayVersion + 1,
    closesAt: parsed.closesOn === null ? null : endOfDay(parsed.closesOn),
    confirmedAt: unit.now,
    rulesVersion: RULES_VERSION,
    submittedAt: unit.now,
    stateReason: null,
  };
}

function certificateInUse(error: unknown): AppError | null {
  if (!(error instanceof UniqueConstraintError)) return null;
  const detail = 'Another live lot stands on this certificate.';
  if ('certificates_live' in error.fields) {
    return new ConflictError('certificate-in-use', detail, [
      { pointer: '/certificate/number', code: 'certificate-in-use', message: detail },
    ]);
  }
  if ('certificates_live_file' in error.fields) {
    return new ConflictError('certificate-in-use', detail, [
      { pointer: '/certificate/fileId', code: 'certificate-in-use', message: detail },
    ]);
  }
  return null;
}

/**
 * Hands a draft to the desk: checks everything and tells all that is missing at once, then writes assay and certificate
 * under a new version and moves the lot to `submitted`. That a certificate serves one live lot only is held by two UNIQUE
 * keys (laboratory with number, and the document's own bytes), so that two submissions at once cannot both pass.
 * Expects the lot's lock.
 *
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`, `payout-onboarding-required`,
 * `lot-not-complete`, `certificate-in-use`.
 */
export async function submitLot({ lotId }: { lotId: string }, unit: Unit, actor: Actor): Promise<Lot> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'draft') {
    throw new ConflictError('illegal-transition', 'Only a draft can be handed to the desk.');
  }
  const seller = await readSeller(unit, actor);
  const { parsed, backing } = await readComplete(lot, unit);
  await moveLot(
    lot,
    'submitted',
    {
      act: 'submitted',
      actorKind: 'seller',
      actorId: actor.id,
      detail: { assayVersion: lot.assayVersion + 1 },
      changes: columnsOf(parsed, lot, seller.region, unit),
    },
    unit,
  );
  await writeAssays(lot, parsed, unit);
  try {
    await writeCertificate(lot, parsed.certificate, backing, unit);
  } catch (error) {
    throw certificateInUse(error) ?? error;
  }
  return lot;
}
