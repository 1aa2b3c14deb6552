import { useState } from 'react';
import { examineRequest, returnRequest, type CaseAnswer } from '#shared/schemas/desk.ts';
import { Fieldset } from '../../../components/ui/field.tsx';
import { RadioGroup } from '../../../components/ui/inputs.tsx';
import { sendCaseAct } from '../api/certificates.ts';
import { useCaseRefresh, useCaseReload } from '../hooks/use-case-refresh.ts';
import { ReasonForm } from './reason-form.tsx';
import { VerifyForm } from './verify-form.tsx';

function ReturnForm({ view }: { view: CaseAnswer }) {
  const refresh = useCaseRefresh();
  const reload = useCaseReload(view.id);
  return (
    <ReasonForm
      label="Return"
      fieldLabel="Reason for the seller"
      hint="It stands in the lot’s history and in a mail. Say what to change."
      schema={returnRequest}
      extra={{ version: view.version }}
      send={(input) => sendCaseAct(view.id, 'return', input)}
      onDone={(answer) => refresh(answer, 'Returned: the seller reads the reason.')}
      onRefused={reload}
      look="danger"
      submitText="Return the lot"
      question="Return this lot to its seller?"
      counterparty={`${view.seller.displayName}, lot ${view.lot.code}`}
      consequence="The seller can change the lot and hand it in again. Nothing entered is lost."
      confirmText={`Return lot ${view.lot.code}`}
    />
  );
}

function ExamineForm({ view }: { view: CaseAnswer }) {
  const refresh = useCaseRefresh();
  const reload = useCaseReload(view.id);
  return (
    <ReasonForm
      label="Examine"
      name="note"
      fieldLabel="What was looked at?"
      hint="The seller reads it in the lot’s history and in a mail."
      schema={examineRequest}
      extra={{ version: view.version }}
      send={(input) => sendCaseAct(view.id, 'examine', input)}
      onDone={(answer) => refresh(answer, 'Marked as examined.')}
      onRefused={reload}
      submitText="Mark as examined"
      question="Mark this lot as examined?"
      counterparty={`${view.seller.displayName}, lot ${view.lot.code}`}
      consequence="The lot does not open: it stays with the desk. The case can be taken up again."
      confirmText={`Mark lot ${view.lot.code} as examined`}
    />
  );
}

const CHOICES = [
  { value: 'verify', label: 'Verify', hint: 'The laboratory confirmed the report.' },
  { value: 'examine', label: 'Mark as examined', hint: 'Looked at, but not a verified certificate.' },
  { value: 'return', label: 'Return to the seller', hint: 'Something must be changed first.' },
];

/** The three ways to decide; only the chosen one asks for anything. */
export function DecidePanel({ view }: { view: CaseAnswer }) {
  const [choice, setChoice] = useState('');
  return (
    <div className="flex flex-col gap-6">
      <Fieldset id="decide" legend="What is your decision?">
        <RadioGroup
          id="decide-choice"
          name="decide-choice"
          options={CHOICES}
          value={choice}
          onChange={(event) => setChoice(event.target.value)}
        />
      </Fieldset>
      {choice === 'verify' && <VerifyForm view={view} />}
      {choice === 'examine' && <ExamineForm view={view} />}
      {choice === 'return' && <ReturnForm view={view} />}
    </div>
  );
}
