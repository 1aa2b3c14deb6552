import { useSuspenseQuery } from '@tanstack/react-query';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { GradeStamp } from '../../../components/figures/lot-words.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { caseQuery } from '../api/certificates.ts';
import { CaseDecision, CaseLot } from './case-lot.tsx';
import { ClaimPanel } from './claim-panel.tsx';
import { ComparisonTable } from './comparison-table.tsx';
import { DecidePanel } from './decide-panel.tsx';
import { DeskPage } from './desk-page.tsx';
import { DocumentView } from './document-view.tsx';
import { FlagList } from './flag-list.tsx';
import { PullLotForm } from './pull-lot-form.tsx';
import { ReportFacts } from './report-facts.tsx';

/** What verification would come to, said before anyone sets to work. */
function Outlook({ view }: { view: CaseAnswer }) {
  if (view.proposedGrade === 'certified')
    return (
      <Notice tone="good">
        As entered, verification makes it <GradeStamp grade="certified" /> and opens the lot.
      </Notice>
    );
  return (
    <Notice tone="attention" title="As entered, this cannot be certified">
      <ul className="list-disc pl-5">
        {view.gaps.map((gap) => (
          <li key={gap}>{gap}</li>
        ))}
      </ul>
    </Notice>
  );
}

function Deciding({ view }: { view: CaseAnswer }) {
  return (
    <section aria-labelledby="deciding-heading" className="sheet flex flex-col gap-5 p-4 sm:p-6">
      <h2 id="deciding-heading">Deciding</h2>
      <Outlook view={view} />
      <ClaimPanel view={view} />
      {view.can.verify && <DecidePanel view={view} />}
    </section>
  );
}

/** Document on one side, what was entered from it on the other, the decision below. */
export function CasePage({ id }: { id: string }) {
  const { data: view } = useSuspenseQuery(caseQuery(id));
  const isOpen = view.state === 'submitted' || view.state === 'claimed' || view.can.claim;
  return (
    <DeskPage
      title={`Case of lot ${view.lot.code}`}
      heading={view.lot.title}
      sub={
        <>
          Lot <span className="fig">{view.lot.code}</span>, handed in <Time at={view.submittedAt} />
        </>
      }
    >
      <div className="grid gap-8 lg:grid-cols-2">
        <div className="min-w-0 lg:sticky lg:top-4 lg:self-start">
          <DocumentView document={view.document} />
        </div>
        <div className="flex min-w-0 flex-col gap-8">
          <FlagList flags={view.flags} />
          <ReportFacts report={view.report} />
          <ComparisonTable rows={view.comparison} />
          {view.decision && <CaseDecision decision={view.decision} />}
          {isOpen && <Deciding view={view} />}
          <CaseLot view={view} />
          {view.can.pull && (
            <details className="border-t border-rule pt-4">
              <summary className="py-1 font-medium">Pull this lot</summary>
              <div className="mt-4">
                <PullLotForm code={view.lot.code} sellerName={view.seller.displayName} />
              </div>
            </details>
          )}
        </div>
      </div>
    </DeskPage>
  );
}
