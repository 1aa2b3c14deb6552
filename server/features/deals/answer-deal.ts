import type { DealAnswer } from '#shared/schemas/deals.ts';
import { databaseNow, withTransaction, type Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { presentDeal } from './deal-presenter.ts';
import { findDealIds, loadDealView } from './deal-queries.ts';

/** The deal as it stands now, or inside the transaction that has changed it. */
export async function answerDeal(dealId: string, actor: Actor, unit?: Unit): Promise<DealAnswer> {
  const now = unit?.now ?? (await databaseNow());
  return presentDeal(await loadDealView(dealId, unit?.tx), actor, now);
}

/** Runs a command that moves no money under the deal's lock and answers with the deal after it. */
export async function changeDeal(
  code: string,
  actor: Actor,
  change: (dealId: string, unit: Unit) => Promise<Deal>,
): Promise<DealAnswer> {
  const { id } = await findDealIds(code);
  return withTransaction({ deals: [id] }, async (unit) => {
    await change(id, unit);
    return answerDeal(id, actor, unit);
  });
}
