import type { ReactNode } from 'react';
import type { TypedQuantity } from '#shared/lot-contents.ts';
import { Quantity } from '../figures/quantity.tsx';
import { Field } from '../ui/field.tsx';
import { NumberInput, Select } from '../ui/inputs.tsx';
import type { Beside } from './figures-beside.ts';
import { fieldIdOf } from './field-ids.ts';
import { useDraftForm } from './draft-form-context.ts';

export type UnitOption = { value: string; label: string };

type QuantityFieldProps = {
  pointer: string;
  label: ReactNode;
  /** Names the unit's own control, which has no label above it. */
  unitLabel: string;
  units: UnitOption[];
  value: TypedQuantity;
  onChange: (value: TypedQuantity) => void;
  hint?: ReactNode;
  optional?: boolean;
  /** The same figure in other units, or what is assumed when none is given. */
  beside?: Beside[];
  remark?: ReactNode;
};

/** A figure and the unit it is typed in, side by side; under them the same in the other units. */
export function QuantityField(props: QuantityFieldProps) {
  const { pointer, label, unitLabel, units, value, onChange, hint, optional, beside = [], remark } = props;
  const { errorAt } = useDraftForm();
  const unitError = errorAt(`${pointer}/unit`);
  return (
    <Field
      id={fieldIdOf(`${pointer}/value`)}
      label={label}
      hint={hint}
      optional={optional}
      error={errorAt(`${pointer}/value`) ?? unitError}
      beside={
        (beside.length > 0 || remark) && (
          <span className="flex flex-wrap gap-x-4">
            {beside.map((figure) => (
              <Quantity key={figure.unit} {...figure} />
            ))}
            {remark && <span>{remark}</span>}
          </span>
        )
      }
    >
      {(ties) => (
        <span className="flex gap-2">
          <NumberInput
            {...ties}
            maxLength={40}
            value={value.value}
            onChange={(event) => onChange({ ...value, value: event.target.value })}
          />
          <span className="w-24 shrink-0">
            <Select
              id={fieldIdOf(`${pointer}/unit`)}
              aria-label={unitLabel}
              aria-invalid={unitError ? true : undefined}
              value={value.unit}
              onChange={(event) => onChange({ ...value, unit: event.target.value })}
            >
              {!units.some((unit) => unit.value === value.unit) && <option value="">unit</option>}
              {units.map((unit) => (
                <option key={unit.value} value={unit.value}>
                  {unit.label}
                </option>
              ))}
            </Select>
          </span>
        </span>
      )}
    </Field>
  );
}
