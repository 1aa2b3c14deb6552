import { useQueryClient } from '@tanstack/react-query';
import { laboratoryRequest, type LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { Field } from '../../../components/ui/field.tsx';
import { Checkbox, TextInput } from '../../../components/ui/inputs.tsx';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { laboratoriesQuery, sendLaboratory } from '../api/laboratories.ts';
import { useActForm } from '../hooks/use-act-form.ts';
import { ActForm } from './act-form.tsx';

const FIELDS = [
  ['name', 'Name', ''],
  ['accreditationBody', 'Accredited by', 'The body that accredits it'],
  ['accreditationNumber', 'Accreditation number', ''],
  ['scope', 'Scope', 'Metals and methods that the accreditation covers'],
  ['region', 'Region', ''],
  ['contact', 'How the desk reaches it', 'Taken from the accreditation body, never from a report'],
  ['validUntil', 'Valid until', ''],
] as const;

type LaboratoryFormProps = { laboratory: LaboratoryAnswer | null; onSaved: () => void };

/** Adds a laboratory to the register, or changes one. */
export function LaboratoryForm({ laboratory, onSaved }: LaboratoryFormProps) {
  const client = useQueryClient();
  const form = useActForm({
    initial: {
      name: laboratory?.name ?? '',
      accreditationBody: laboratory?.accreditationBody ?? '',
      accreditationNumber: laboratory?.accreditationNumber ?? '',
      scope: laboratory?.scope ?? '',
      region: laboratory?.region ?? '',
      contact: laboratory?.contact ?? '',
      validUntil: laboratory?.validUntil ?? '',
      isActive: laboratory?.isActive ?? true,
    },
    schema: laboratoryRequest,
    send: (input) => sendLaboratory(laboratory?.id ?? null, input),
    onDone: async (answer) => {
      await client.invalidateQueries({ queryKey: laboratoriesQuery.queryKey });
      confirmDone(`${answer.name} is on the register.`);
      onSaved();
    },
  });
  const name = form.values.name || 'the laboratory';
  const act = laboratory === null ? `Put ${name} on the register` : `Change ${laboratory.name}`;
  return (
    <ActForm
      label="Laboratory"
      form={form}
      submitText={laboratory === null ? 'Put it on the register' : 'Change the entry'}
      question={`${act}?`}
      counterparty={name}
      consequence="Grades given from now on follow this entry; those given before stay. The change stands in the audit trail."
      confirmText={act}
    >
      {FIELDS.map(([field, label, hint]) => (
        <Field key={field} id={form.fieldId(field)} label={label} hint={hint} error={form.errorOf(field)}>
          {(ties) => (
            <TextInput
              {...ties}
              type={field === 'validUntil' ? 'date' : 'text'}
              value={form.values[field]}
              onChange={(event) => form.set(field, event.target.value)}
            />
          )}
        </Field>
      ))}
      <Checkbox
        id={form.fieldId('isActive')}
        label="Active"
        hint="Only an active laboratory can be named in a verification."
        checked={form.values.isActive}
        onChange={(event) => form.set('isActive', event.target.checked)}
      />
    </ActForm>
  );
}
