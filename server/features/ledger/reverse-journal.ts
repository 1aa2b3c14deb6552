import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { LedgerAccount } from '#server/models/ledger-account.ts';
import { LedgerEntry } from '#server/models/ledger-entry.ts';
import { LedgerJournal } from '#server/models/ledger-journal.ts';
import type { AccountRef } from './account-ref.ts';
import { postJournal, type JournalKind } from './post-journal.ts';

function refOf({ kind, ownerId }: LedgerAccount): AccountRef {
  if (kind === 'escrow') return { kind, dealId: ownerId };
  if (kind === 'member_payable' || kind === 'member_connected') return { kind, memberId: ownerId };
  return { kind };
}

/**
 * Takes a journal back by a new one with every sign turned; the first stays as it was. `kind` tells why where the books
 * have a word for it (`payout_returned`), else it is a `reversal`. A journal is reversed once, and a reversal never.
 * Locks as `postJournal` does.
 *
 * Throws `illegal-transition` when it was reversed before, `deal-not-funded` when escrow no longer holds the sum.
 */
export async function reverseJournal(
  input: { uniqueKey: string; memo: string; kind?: JournalKind; providerObjectId?: string | null },
  unit: Unit,
): Promise<string> {
  const journal = await LedgerJournal.findOne({
    where: { uniqueKey: input.uniqueKey },
    include: [{ model: LedgerEntry, as: 'entries', include: [{ model: LedgerAccount, as: 'account' }] }],
    transaction: unit.tx,
  });
  invariant(journal !== null, `there is no journal ${input.uniqueKey} to reverse`);
  invariant(journal.reversesJournalId === null, 'a reversal is not reversed');
  const entries = (journal.entries ?? []).map(({ account, amountMinor }) => {
    invariant(account !== undefined, 'an entry has its account');
    return { account: refOf(account), amountMinor: -amountMinor };
  });
  return postJournal(
    {
      kind: input.kind ?? 'reversal',
      dealId: journal.dealId,
      uniqueKey: `reversal:${journal.id}`,
      memo: input.memo,
      providerObjectId: input.providerObjectId ?? journal.providerObjectId,
      reversesJournalId: journal.id,
      entries,
    },
    unit,
  );
}
