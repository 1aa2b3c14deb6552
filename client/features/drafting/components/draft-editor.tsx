import { useCallback, useMemo, useRef, type FocusEvent, type ReactNode } from 'react';
import type { LotAnswer, LotDraft } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { ErrorSummary } from '../../../components/ui/error-summary.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { useReader } from '../../../lib/reader-context.ts';
import { useMember } from '../../../lib/session.ts';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { DraftFormContext } from '../../../components/lot-form/draft-form-context.ts';
import { useDraftProblems } from '../hooks/use-draft-problems.ts';
import { useDraftSaving, type DraftSaving } from '../hooks/use-draft-saving.ts';
import { useLeaveGuard } from '../hooks/use-leave-guard.ts';
import { useLiveSheet } from '../hooks/use-live-sheet.ts';
import { PAYOUTS_FIRST, useSubmission } from '../hooks/use-submission.ts';
import { startingDraft } from '../starting-draft.ts';
import { ConflictPanel } from './conflict-panel.tsx';
import { DeleteDraftButton } from './delete-draft-button.tsx';
import { DraftFormFields } from './draft-form-fields.tsx';
import { LiveSheet } from './live-sheet.tsx';
import { PayoutsFirst } from './payouts-first.tsx';
import { SaveLine } from './save-line.tsx';
import { SheetLine } from './sheet-line.tsx';
import { SubmitQuestion } from './submit-question.tsx';

/** On a narrow screen the bar is one row of buttons, so that it hides no field. */
const compact = 'max-sm:min-h-9 max-sm:px-2 max-sm:py-1 max-sm:text-note';

type DraftEditorProps = {
  lot: LotAnswer;
  draft: LotDraft;
  /** The parts of the form for photos and certificate. */
  evidence: ReactNode;
  onSubmitted: (lot: LotAnswer) => void;
};

/** The form of one lot: kept as typed, priced while typing, handed to the desk when it is complete. */
export function DraftEditor({ lot, draft: kept, evidence, onSubmitted }: DraftEditorProps) {
  const { weightUnit } = useReader();
  const canSell = useMember()?.can.sell ?? false;
  const isGone = useRef(false);
  const saving = useDraftSaving(lot.code, {
    draft: useMemo(() => startingDraft(kept, weightUnit), [kept, weightUnit]),
    version: lot.version,
  });
  const { draft, change, state, save } = saving;
  const problems = useDraftProblems(draft);
  const { errorAt, touch } = problems;
  const live = useLiveSheet(draft);
  const { isDirty } = saving;
  const isUnsaved = useCallback(() => !isGone.current && isDirty(), [isDirty]);
  const submission = useSubmission(lot.code, saving, problems, { canSell, onDone: onSubmitted });
  const leave = useLeaveGuard(isUnsaved, save);
  const form = useMemo(
    () => ({ code: lot.code, draft, change, errorAt }),
    [lot.code, draft, change, errorAt],
  );
  const wasSubmitted = lot.history.some((event) => event.act === 'submitted');
  const title = draft.title.trim() === '' ? 'A new lot' : draft.title;
  return (
    <Page title={title} sub={`Draft ${lot.code}: nobody but you sees it`}>
      <OfflineNotice />
      <ErrorSummary items={problems.items} attempt={problems.attempt} />
      {!canSell && <PayoutsFirst id={fieldIdOf(PAYOUTS_FIRST.pointer)} />}
      <Conflict saving={saving} />
      <div className="grid grid-cols-1 items-start gap-x-10 gap-y-8 lg:grid-cols-[minmax(0,1fr)_25rem]">
        <form
          noValidate
          aria-label="Lot"
          className="min-w-0 [&_:is(input,select,textarea,button,fieldset)]:scroll-mb-32"
          onBlur={(event: FocusEvent) => touch(event.target.id)}
          onSubmit={(event) => {
            event.preventDefault();
            submission.ask();
          }}
        >
          <DraftFormContext value={form}>
            <DraftFormFields evidence={evidence} />
          </DraftFormContext>
          <div className="no-print sticky bottom-0 z-10 -mx-1 border-t border-line bg-paper px-1 py-1.5 sm:py-3">
            <SheetLine sheet={live.sheet} />
            {submission.isConfirming ? (
              <SubmitQuestion submission={submission} draft={draft} />
            ) : (
              <div className="flex flex-wrap items-center gap-x-2 gap-y-0.5 sm:gap-3">
                <Button type="submit" className={compact}>
                  Hand the lot to the desk
                </Button>
                <SaveLine state={state} onSave={() => void save()} />
              </div>
            )}
          </div>
        </form>
        <div className="lg:sticky lg:top-4 lg:max-h-[calc(100dvh-2rem)] lg:overflow-y-auto lg:pt-6">
          <LiveSheet live={live} isLinked={draft.pricing === 'linked'} />
        </div>
      </div>
      {!wasSubmitted && (
        <div className="mt-8">
          <DeleteDraftButton code={lot.code} onDeleted={() => (isGone.current = true)} />
        </div>
      )}
      <LeaveQuestion leave={leave} />
    </Page>
  );
}

function Conflict({ saving: { state, draft, keepMine, takeTheirs } }: { saving: DraftSaving }) {
  const { weightUnit } = useReader();
  if (state.kind !== 'conflict') return null;
  return (
    <ConflictPanel
      mine={draft}
      theirs={state.theirs}
      onKeepMine={() => void keepMine(state.theirs)}
      onTakeTheirs={(theirs, version) => takeTheirs(startingDraft(theirs, weightUnit), version)}
    />
  );
}

function LeaveQuestion({ leave }: { leave: ReturnType<typeof useLeaveGuard> }) {
  return (
    <Dialog open={leave.isAsking} onClose={leave.stay} title="The draft is not saved yet">
      <p>What you typed since the last save stands only on this page and is lost when you leave it.</p>
      <div className="mt-4 flex flex-wrap gap-3">
        <Button onClick={leave.stay}>Stay on this page</Button>
        <Button look="danger" onClick={leave.leave}>
          Leave without saving
        </Button>
      </div>
    </Dialog>
  );
}
