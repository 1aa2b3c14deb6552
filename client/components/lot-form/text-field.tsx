import type { ReactNode } from 'react';
import type { LotDraft } from '#shared/schemas/lots.ts';
import { Field } from '../ui/field.tsx';
import { TextInput } from '../ui/inputs.tsx';
import { fieldIdOf } from './field-ids.ts';
import { useDraftForm } from './draft-form-context.ts';

type ReportText = {
  [K in keyof LotDraft['certificate']]: LotDraft['certificate'][K] extends string ? K : never;
}[keyof LotDraft['certificate']];

type TextFieldProps = {
  pointer: `/certificate/${ReportText}`;
  label: ReactNode;
  type?: 'text' | 'date';
  hint?: ReactNode;
  optional?: boolean;
  maxLength?: number;
};

/** A line of text of the report. */
export function TextField({ pointer, label, type = 'text', hint, optional, maxLength }: TextFieldProps) {
  const { draft, change, errorAt } = useDraftForm();
  const key = pointer.slice('/certificate/'.length) as ReportText;
  return (
    <Field id={fieldIdOf(pointer)} label={label} hint={hint} optional={optional} error={errorAt(pointer)}>
      {(ties) => (
        <TextInput
          {...ties}
          type={type}
          maxLength={maxLength}
          value={draft.certificate[key]}
          onChange={({ target: { value } }) =>
            change((before) => ({ ...before, certificate: { ...before.certificate, [key]: value } }))
          }
        />
      )}
    </Field>
  );
}
