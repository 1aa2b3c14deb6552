import type { DealAnswer } from '#shared/schemas/deals.ts';
import { SettlementSheetView } from '../../../components/figures/settlement-sheet-view.tsx';

/** The sheets of the deal, the final one first, and its documents. */
export function DealPapers({ deal }: { deal: DealAnswer }) {
  const pdf = `/api/v1/deals/${encodeURIComponent(deal.code)}/sheet.pdf`;
  const side = deal.side === 'desk' ? ', the seller’s' : '';
  return (
    <section aria-labelledby="deal-papers" className="min-w-0 border-t border-rule pt-8">
      <div className="mb-4 flex flex-wrap items-baseline justify-between gap-x-8 gap-y-2">
        <h2 id="deal-papers">Sheets and documents</h2>
        <ul className="no-print flex flex-wrap gap-x-6 gap-y-1">
          <li>
            <a href={pdf} className="link inline-block py-1" target="_blank" rel="noreferrer">
              {deal.finalSheet ? 'Final sheet' : 'Provisional sheet'} as PDF
            </a>
          </li>
          {deal.certificateUrl && (
            <li>
              <a
                href={deal.certificateUrl}
                className="link inline-block py-1"
                target="_blank"
                rel="noreferrer"
              >
                The laboratory’s certificate
              </a>
            </li>
          )}
        </ul>
      </div>
      <div className="flex flex-col gap-8">
        {deal.finalSheet && <SettlementSheetView sheet={deal.finalSheet} title={`Final sheet${side}`} />}
        <SettlementSheetView sheet={deal.provisionalSheet} title={`Provisional sheet${side}`} />
      </div>
    </section>
  );
}
