import { refinedSheet } from '#shared/settlement/refined-sheet.ts';
import { SettlementSheetView } from '../../../components/figures/settlement-sheet-view.tsx';

/** An invented button at an invented quote, computed by the rules that every deal is computed by. */
const sheet = refinedSheet({
  gross: { value: '31.024', unit: 'g' },
  readability: { value: '0.001', unit: 'g' },
  contents: [
    {
      metal: 'Au',
      fineness: { value: '999.2', unit: 'permille' },
      uncertainty: { value: '0.4', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
  ],
  quotes: [
    { id: null, metal: 'Au', usdPerTroyOunce: '2000.00', at: null, source: 'invented for this example' },
  ],
  price: { amount: '1950.00' },
  shipping: { amount: '28.00' },
  commission: null,
  moment: 'estimated',
  audience: 'buyer',
});

export function WorkedExample() {
  return <SettlementSheetView sheet={sheet} title="An example sheet" />;
}
