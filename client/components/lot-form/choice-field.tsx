import type { ReactNode } from 'react';
import { Field } from '../ui/field.tsx';
import { Select } from '../ui/inputs.tsx';
import { fieldIdOf } from './field-ids.ts';
import { useDraftForm } from './draft-form-context.ts';

type Option = { value: string; label: string };

type ChoiceFieldProps = {
  pointer: string;
  label: ReactNode;
  /** Shown while nothing is chosen. */
  blank: string;
  options?: Option[];
  groups?: { label: string; options: Option[] }[];
  value: string;
  onChange: (value: string) => void;
  hint?: ReactNode;
  optional?: boolean;
  beside?: ReactNode;
};

/** One of a list, tied to a place in the draft. */
export function ChoiceField(props: ChoiceFieldProps) {
  const { pointer, label, blank, options = [], groups = [], value, onChange, ...rest } = props;
  const { errorAt } = useDraftForm();
  return (
    <Field id={fieldIdOf(pointer)} label={label} error={errorAt(pointer)} {...rest}>
      {(ties) => (
        <Select {...ties} value={value} onChange={(event) => onChange(event.target.value)}>
          <option value="">{blank}</option>
          <Options options={options} />
          {groups.map((group) => (
            <optgroup key={group.label} label={group.label}>
              <Options options={group.options} />
            </optgroup>
          ))}
        </Select>
      )}
    </Field>
  );
}

function Options({ options }: { options: Option[] }) {
  return options.map((option) => (
    <option key={option.value} value={option.value}>
      {option.label}
    </option>
  ));
}
