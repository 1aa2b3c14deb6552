import { useSuspenseQuery } from '@tanstack/react-query';
import { verifyRequest, type CaseAnswer } from '#shared/schemas/desk.ts';
import { Field } from '../../../components/ui/field.tsx';
import { Checkbox, Select, TextInput } from '../../../components/ui/inputs.tsx';
import { sendCaseAct } from '../api/certificates.ts';
import { laboratoriesQuery } from '../api/laboratories.ts';
import { useActForm } from '../hooks/use-act-form.ts';
import { useCaseRefresh, useCaseReload } from '../hooks/use-case-refresh.ts';
import { ActForm } from './act-form.tsx';

function outcomeOf(view: CaseAnswer): string {
  if (view.state === 'verified') return 'Verified: the lot is open.';
  return 'Examined: the lot stays with the desk, and the seller is told why.';
}

/** How, with whom and when the report was confirmed; the grade follows from it and from the figures. */
export function VerifyForm({ view }: { view: CaseAnswer }) {
  const { data: laboratories } = useSuspenseQuery(laboratoriesQuery);
  const refresh = useCaseRefresh();
  const reload = useCaseReload(view.id);
  const form = useActForm({
    initial: {
      laboratoryId: view.report.laboratory?.isActive ? view.report.laboratory.id : '',
      confirmedHow: '',
      confirmedWith: '',
      confirmedOn: '',
      isMarkSeen: false,
    },
    schema: verifyRequest,
    extra: { version: view.version },
    send: (input) => sendCaseAct(view.id, 'verify', input),
    onDone: (answer) => refresh(answer, outcomeOf(answer)),
    onRefused: reload,
  });
  const text = (name: 'confirmedHow' | 'confirmedWith' | 'confirmedOn', label: string, hint: string) => (
    <Field id={form.fieldId(name)} label={label} hint={hint} error={form.errorOf(name)}>
      {(ties) => (
        <TextInput
          {...ties}
          type={name === 'confirmedOn' ? 'date' : 'text'}
          value={form.values[name]}
          onChange={(event) => form.set(name, event.target.value)}
        />
      )}
    </Field>
  );
  const laboratory = laboratories.find(({ id }) => id === form.values.laboratoryId);
  return (
    <ActForm
      label="Verify"
      form={form}
      submitText="Verify the certificate"
      question="Verify this certificate?"
      counterparty={`${view.seller.displayName}, lot ${view.lot.code}`}
      consequence={`You say that ${laboratory?.name ?? 'the laboratory'} confirmed report ${view.report.number}. Without a gap the lot opens at once as certified; else it stays with the desk as examined.`}
      confirmText={`Verify report ${view.report.number}`}
    >
      <Field
        id={form.fieldId('laboratoryId')}
        label="Laboratory on the register"
        hint={`On the report: ${view.report.laboratoryName}`}
        error={form.errorOf('laboratoryId')}
      >
        {(ties) => (
          <Select
            {...ties}
            value={form.values.laboratoryId}
            onChange={(event) => form.set('laboratoryId', event.target.value)}
          >
            <option value="">Choose</option>
            {laboratories
              .filter((row) => row.isActive)
              .map((row) => (
                <option key={row.id} value={row.id}>
                  {row.name} ({row.accreditationNumber})
                </option>
              ))}
          </Select>
        )}
      </Field>
      {text(
        'confirmedHow',
        'How was it confirmed?',
        'Such as: by telephone, with the number from the register',
      )}
      {text('confirmedWith', 'With whom?', 'Name and function at the laboratory')}
      {text('confirmedOn', 'On which day?', 'The day on which the laboratory confirmed it')}
      {view.report.itemMark && (
        <Checkbox
          id={form.fieldId('isMarkSeen')}
          label={`I see the mark “${view.report.itemMark}” on the lot’s photos`}
          hint="Ties the report to the piece where the masses do not."
          checked={form.values.isMarkSeen}
          onChange={(event) => form.set('isMarkSeen', event.target.checked)}
        />
      )}
    </ActForm>
  );
}
