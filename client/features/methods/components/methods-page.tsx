import { Link } from 'react-router-dom';
import { RULES_VERSION } from '#shared/rules.ts';
import { ENGINE_VERSION } from '#shared/settlement/refined-sheet.ts';
import { Page } from '../../../components/ui/page.tsx';
import { paths } from '../../../lib/paths.ts';
import { Contents } from './contents.tsx';
import { CommissionPart, DealPart, EvidencePart, QuotesPart } from './house-parts.tsx';
import { FinenessPart, MassPart, MeltPart, UncertaintyPart } from './measure-parts.tsx';

const parts = [
  { id: 'mass', title: 'Mass' },
  { id: 'fineness', title: 'Fineness' },
  { id: 'melt', title: 'Melt value and rounding' },
  { id: 'uncertainty', title: 'How sure a figure is' },
  { id: 'evidence', title: 'Evidence grades' },
  { id: 'quotes', title: 'Quotes' },
  { id: 'commission', title: 'Commission' },
  { id: 'deal', title: 'Weighing on arrival, and deadlines' },
];

/** How every figure comes about; the numbers are those that the house computes with. */
export function MethodsPage() {
  return (
    <Page
      title="Methods and sources"
      sub={`How every figure comes about. Sheets of version ${ENGINE_VERSION}, rules of ${RULES_VERSION}.`}
    >
      <Contents parts={parts} />
      <MassPart />
      <FinenessPart />
      <MeltPart />
      <UncertaintyPart />
      <EvidencePart />
      <QuotesPart />
      <CommissionPart />
      <DealPart />
      <p className="mt-12 max-w-prose border-t border-rule pt-4 text-ink-2">
        What can hurt and what can be forbidden stands under{' '}
        <Link to={paths.cautions()} className="link">
          Cautions
        </Link>
        . Check your local rules; this is not legal advice.
      </p>
    </Page>
  );
}
