import { PASSWORD_LENGTH_MIN } from '#shared/limits.ts';
import { Field, FieldError } from '../../../components/ui/field.tsx';
import { Checkbox, Select, TextInput } from '../../../components/ui/inputs.tsx';
import { TIME_ZONES, timeZoneName } from '../../../lib/time-zones.ts';
import type { SignUpValues } from '../sign-up-values.ts';

type Name = keyof SignUpValues & string;
type SignUpFieldsProps = {
  form: {
    values: SignUpValues;
    fieldId: (name: Name) => string;
    errorOf: (name: Name) => string | undefined;
    set: (name: Name, value: string | boolean) => void;
  };
};

const lines = [
  { name: 'email', label: 'E-mail', type: 'email', autoComplete: 'username', hint: undefined },
  {
    name: 'password',
    label: 'Password',
    type: 'password',
    autoComplete: 'new-password',
    hint: `At least ${PASSWORD_LENGTH_MIN} characters; a sentence is easy to keep.`,
  },
  {
    name: 'displayName',
    label: 'Name',
    type: 'text',
    autoComplete: 'name',
    hint: 'The other side of a deal reads it; nobody else does.',
  },
  {
    name: 'region',
    label: 'Region',
    type: 'text',
    autoComplete: 'address-level1',
    hint: 'All that the public sees of your place, beside your lots.',
  },
] as const;

export function SignUpFields({ form }: SignUpFieldsProps) {
  const ageError = form.errorOf('isOfAge');
  const ageId = form.fieldId('isOfAge');
  return (
    <>
      {lines.map(({ name, label, type, autoComplete, hint }) => (
        <Field key={name} id={form.fieldId(name)} label={label} hint={hint} error={form.errorOf(name)}>
          {(ties) => (
            <TextInput
              {...ties}
              type={type}
              autoComplete={autoComplete}
              value={form.values[name]}
              onChange={(event) => form.set(name, event.target.value)}
            />
          )}
        </Field>
      ))}
      <Field
        id={form.fieldId('timeZone')}
        label="Time zone"
        hint="Guessed from your browser. Deadlines are told and counted in it."
        error={form.errorOf('timeZone')}
      >
        {(ties) => (
          <Select
            {...ties}
            value={form.values.timeZone}
            onChange={(event) => form.set('timeZone', event.target.value)}
          >
            {TIME_ZONES.map((zone) => (
              <option key={zone} value={zone}>
                {timeZoneName(zone)}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <div className={ageError ? 'border-l-2 border-litharge pl-3' : ''}>
        {ageError && <FieldError id={`${ageId}-error`}>{ageError}</FieldError>}
        <Checkbox
          id={ageId}
          label="I am 18 or older"
          aria-invalid={ageError ? true : undefined}
          aria-describedby={ageError ? `${ageId}-error` : undefined}
          checked={form.values.isOfAge}
          onChange={(event) => form.set('isOfAge', event.target.checked)}
        />
      </div>
    </>
  );
}
