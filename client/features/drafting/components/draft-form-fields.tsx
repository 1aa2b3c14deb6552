import type { ReactNode } from 'react';
import { AssaySection } from './assay-section.tsx';
import { CautionsSection } from './cautions-section.tsx';
import { KindSection } from './kind-section.tsx';
import { MassSection } from './mass-section.tsx';
import { TermsSection } from './terms-section.tsx';

/** The parts of the form in the order in which a lot is made ready; its photos and papers are handed in. */
export function DraftFormFields({ evidence }: { evidence: ReactNode }) {
  return (
    <>
      <KindSection />
      <MassSection />
      <AssaySection />
      {evidence}
      <TermsSection />
      <CautionsSection />
    </>
  );
}
