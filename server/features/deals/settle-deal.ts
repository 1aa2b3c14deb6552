import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { postJournal, type JournalEntry } from '#server/features/ledger/post-journal.ts';
import { releaseDeal } from '#server/features/payouts/release-deal.ts';
import type { Deal } from '#server/models/deal.ts';
import { netMinorOf } from './deal-mails.ts';
import { storeFinalSheets } from './deal-sheets.ts';
import { moveDeal, type DealAct } from './move-deal.ts';

function settlementEntries(deal: Deal): JournalEntry[] {
  const entries: JournalEntry[] = [
    { account: { kind: 'escrow', dealId: deal.id }, amountMinor: deal.totalMinor },
    { account: { kind: 'member_payable', memberId: deal.sellerId }, amountMinor: -netMinorOf(deal) },
    { account: { kind: 'commission' }, amountMinor: -deal.commissionMinor },
  ];
  return entries.filter(({ amountMinor }) => amountMinor !== 0n);
}

/**
 * Settles a deal as stated: the final sheets, the settlement journal (all that is held becomes what the seller is owed and
 * the commission), and the order to release. Once only: the journal's key is unique.
 *
 * The caller holds the deal's lock. Throws `illegal-transition`, `deal-not-funded`, `payout-account-not-ready`.
 */
export async function settleDeal(
  deal: Deal,
  act: Pick<DealAct, 'actorKind' | 'actorId' | 'detail'> & { act?: string },
  unit: Unit,
): Promise<Deal> {
  const final = await storeFinalSheets(deal.id, unit);
  const total = (final.buyerSheet as { total: string | null }).total;
  invariant(total !== null, 'a final sheet has its total');
  await postJournal(
    {
      kind: 'settlement',
      dealId: deal.id,
      uniqueKey: `settlement:${deal.id}`,
      memo: `Settled ${deal.code}`,
      entries: settlementEntries(deal),
    },
    unit,
  );
  await moveDeal(deal, 'settled', { act: 'settled', ...act, changes: { settledAt: unit.now } }, unit);
  await releaseDeal({ deal, amountMinor: netMinorOf(deal) }, unit);
  return deal;
}
