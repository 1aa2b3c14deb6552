import { isMassUnit } from '#shared/mass.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { formName } from '../../../components/figures/lot-words.tsx';
import { Mass } from '../../../components/figures/mass.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { DataList, type DataListRow } from '../../../components/ui/data-list.tsx';
import { countriesByName } from '../../../lib/countries.ts';
import { lotFormOf } from './register-row-parts.tsx';

/** '14 deals completed', said without praise. */
export function dealsText(count: number): string {
  if (count === 0) return 'no deal completed yet';
  return count === 1 ? '1 deal completed' : `${count} deals completed`;
}

function rowsOf(lot: LotAnswer): DataListRow[] {
  const rows: DataListRow[] = [{ term: 'Form', data: formName(lotFormOf(lot.form)) }];
  const { gross, readability } = lot;
  if (gross && isMassUnit(gross.unit))
    rows.push({ term: 'Gross mass', data: <Mass entry={{ value: gross.value, unit: gross.unit }} others /> });
  if (readability && isMassUnit(readability.unit))
    rows.push({
      term: 'Balance reads to',
      data: <Mass entry={{ value: readability.value, unit: readability.unit }} />,
    });
  for (const fine of lot.sheet?.fine ?? [])
    rows.push({
      key: fine.metal,
      term: `Fine ${fine.metal}`,
      data: <Mass entry={{ value: fine.grams, unit: 'g' }} others />,
    });
  rows.push({
    term: 'Seller',
    data: `a member, ${lot.seller.region}; ${dealsText(lot.seller.completedDeals)}`,
  });
  if (lot.shipping)
    rows.push({
      term: 'Insured parcel',
      data: (
        <>
          <Money value={lot.shipping.amount} />, insured for the price
        </>
      ),
    });
  if (lot.destinations.length > 0)
    rows.push({
      term: 'Ships to',
      data: countriesByName(lot.destinations)
        .map(({ name }) => name)
        .join(', '),
    });
  return rows;
}

/** Mass, content, who sells and where it can go. */
export function LotParticulars({ lot }: { lot: LotAnswer }) {
  return (
    <section aria-labelledby="lot-particulars">
      <h2 id="lot-particulars">Particulars</h2>
      <DataList rows={rowsOf(lot)} className="mt-3" />
      {lot.description && <p className="mt-4 max-w-prose whitespace-pre-line">{lot.description}</p>}
    </section>
  );
}
