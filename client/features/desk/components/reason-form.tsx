import type { ReactNode } from 'react';
import type { z } from 'zod';
import type { ButtonLook } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea } from '../../../components/ui/inputs.tsx';
import { useActForm } from '../hooks/use-act-form.ts';
import { ActForm } from './act-form.tsx';

type ReasonFormProps<Input, Answer> = {
  label: string;
  /** The field's name in the request. */
  name?: 'reason' | 'note';
  fieldLabel: ReactNode;
  hint: ReactNode;
  schema: z.ZodType<Input>;
  extra?: object;
  send: (input: Input) => Promise<Answer>;
  onDone: (answer: Answer) => Promise<unknown> | void;
  onRefused?: () => Promise<unknown>;
  look?: ButtonLook;
  submitText: ReactNode;
  question: ReactNode;
  counterparty: ReactNode;
  consequence: ReactNode;
  confirmText: ReactNode;
};

/** An act that needs one text: why. */
export function ReasonForm<Input, Answer>(props: ReasonFormProps<Input, Answer>) {
  const { name = 'reason', fieldLabel, hint, schema, extra, send, onDone, onRefused, ...words } = props;
  const form = useActForm({ initial: { [name]: '' }, schema, extra, send, onDone, onRefused });
  return (
    <ActForm form={form} {...words}>
      <Field id={form.fieldId(name)} label={fieldLabel} hint={hint} error={form.errorOf(name)}>
        {(ties) => (
          <Textarea
            {...ties}
            rows={3}
            value={String(form.values[name])}
            onChange={(event) => form.set(name, event.target.value)}
          />
        )}
      </Field>
    </ActForm>
  );
}
