import { Op } from 'sequelize';
import { minorToAmount } from '#shared/money.ts';
import { recompute } from '#shared/settlement/recompute.ts';
import { ENGINE_VERSIONS } from '#shared/settlement/refined-sheet.ts';
import type { RefinedSheetInput, SettlementSheet } from '#shared/settlement/sheet-types.ts';
import { Deal } from '#server/models/deal.ts';
import { DealSheet } from '#server/models/deal-sheet.ts';

const PAGE = 200;

function differencesOf(row: DealSheet, deal: Deal): string[] {
  const input = row.input as RefinedSheetInput;
  const buyer = recompute({ ...input, audience: 'buyer' }, row.buyerSheet as SettlementSheet);
  const seller = recompute(input, row.sellerSheet as SettlementSheet);
  const faults = [...buyer.differences, ...seller.differences];
  if (buyer.sheet.total !== minorToAmount(deal.totalMinor)) faults.push('/total of the deal');
  if (seller.sheet.total !== minorToAmount(deal.totalMinor - deal.commissionMinor))
    faults.push('/net of the deal');
  return faults.map((pointer) => `deal ${deal.code}, ${row.moment} sheet: ${pointer} differs`);
}

/**
 * Computes every stored sheet again from its stored input, and holds it against the stored sheet and the deal's own sums. A
 * sentence for each difference; empty when all is well.
 */
export async function findDifferingSheets(): Promise<string[]> {
  const faults: string[] = [];
  for (let after = ''; ;) {
    const rows = await DealSheet.findAll({
      where: { engineVersion: [...ENGINE_VERSIONS], id: { [Op.gt]: after } },
      order: [['id', 'ASC']],
      limit: PAGE,
    });
    const deals = await Deal.findAll({ where: { id: rows.map(({ dealId }) => dealId) } });
    const byId = new Map(deals.map((deal) => [deal.id, deal]));
    for (const row of rows) {
      const deal = byId.get(row.dealId);
      if (deal !== undefined) faults.push(...differencesOf(row, deal));
    }
    const last = rows.at(-1);
    if (last === undefined || rows.length < PAGE) return faults;
    after = last.id;
  }
}
