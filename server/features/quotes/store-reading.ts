import type { Metal } from '#shared/metals.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Quote } from '#server/models/quote.ts';
import { QuoteCandidate } from '#server/models/quote-candidate.ts';
import { acceptQuote } from './accept-quote.ts';
import { judgeQuote, type Candidate, type Verdict } from './judge-quote.ts';

export type QuoteReading = { metal: Metal; mid: string; bid: string | null; ask: string | null; at: Date };

async function findCandidate(metal: Metal, unit: Unit): Promise<QuoteCandidate | null> {
  return QuoteCandidate.findOne({ where: { metal }, lock: unit.tx.LOCK.UPDATE, transaction: unit.tx });
}

async function keepCandidate(
  known: QuoteCandidate | null,
  metal: Metal,
  candidate: Candidate,
  mustTellAdmin: boolean,
  unit: Unit,
): Promise<void> {
  const adminToldAt = known?.adminToldAt ?? (mustTellAdmin ? unit.now : null);
  const values = { ...candidate, adminToldAt };
  if (known === null) {
    await QuoteCandidate.create(
      { id: newId(), metal, firstSeenAt: unit.now, ...values },
      { transaction: unit.tx },
    );
  } else {
    await known.update(values, { transaction: unit.tx });
  }
  if (adminToldAt === unit.now) {
    await AuditEntry.create(
      {
        id: newId(),
        actorId: null,
        actorRole: 'house',
        act: 'quote-not-confirmed',
        subjectKind: 'metal',
        subjectId: metal,
        at: unit.now,
        detail: { usdPerTroyOunce: candidate.usdPerTroyOunce, polls: candidate.polls },
      },
      { transaction: unit.tx },
    );
  }
}

/**
 * Judges one reading against the last accepted value and stores what follows: the quote, or the candidate that waits.
 * Storing the same reading twice has no second effect.
 */
export async function storeReading(
  reading: QuoteReading,
  source: string,
  isMarketOpen: boolean,
  unit: Unit,
): Promise<Verdict> {
  const candidate = await findCandidate(reading.metal, unit);
  const last = await Quote.findOne({
    where: { metal: reading.metal },
    order: [
      ['acceptedAt', 'DESC'],
      ['quotedAt', 'DESC'],
    ],
    transaction: unit.tx,
  });
  const verdict = judgeQuote(reading, last, candidate, unit.now, isMarketOpen);
  if (verdict.kind === 'quarantine') {
    await keepCandidate(candidate, reading.metal, verdict.candidate, verdict.mustTellAdmin, unit);
  }
  if (verdict.kind === 'accept') {
    await acceptQuote({ ...reading, source, acceptedAt: unit.now }, unit);
    await candidate?.destroy({ transaction: unit.tx });
  }
  return verdict;
}
