import { dec } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { GRAMS_PER_UNIT, MASS_UNIT_LABELS, MASS_UNITS, type MassUnit } from '#shared/mass.ts';
import { massInUnits } from '#shared/mass-in-units.ts';
import { parseMassText } from '#shared/parse-mass-text.ts';
import { Quantity } from '../../../components/figures/quantity.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput, Select } from '../../../components/ui/inputs.tsx';
import { useReader } from '../../../lib/reader-context.ts';
import { fieldIds, type WorthErrors, type WorthForm } from '../worth-form.ts';

type WorthMassFieldsProps = {
  form: WorthForm;
  errors: WorthErrors;
  onChange: (change: Partial<WorthForm>) => void;
};

/** What was weighed, and how finely the balance reads. */
export function WorthMassFields({ form, errors, onChange }: WorthMassFieldsProps) {
  return (
    <fieldset className="min-w-0">
      <legend className="mb-3 text-title font-semibold">The piece on the balance</legend>
      <div className="grid gap-4 sm:grid-cols-[minmax(0,1fr)_8rem_minmax(0,1fr)]">
        <Field
          id={fieldIds.mass}
          label="Mass"
          error={errors[fieldIds.mass]}
          beside={<MassBeside form={form} />}
        >
          {(ties) => (
            <NumberInput
              {...ties}
              value={form.mass}
              onChange={(event) => onChange({ mass: event.target.value })}
            />
          )}
        </Field>
        <Field id={fieldIds.massUnit} label="Unit" error={errors[fieldIds.massUnit]}>
          {(ties) => (
            <Select
              {...ties}
              value={form.massUnit}
              onChange={(event) => onChange({ massUnit: event.target.value as MassUnit })}
            >
              {MASS_UNITS.map((unit) => (
                <option key={unit} value={unit}>
                  {MASS_UNIT_LABELS[unit]}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Field
          id={fieldIds.readability}
          label="Balance reads to"
          error={errors[fieldIds.readability]}
          optional
          beside="The smallest step of the display, such as 0.01."
        >
          {(ties) => (
            <NumberInput
              {...ties}
              value={form.readability}
              unit={MASS_UNIT_LABELS[form.massUnit]}
              onChange={(event) => onChange({ readability: event.target.value })}
            />
          )}
        </Field>
      </div>
    </fieldset>
  );
}

/** The mass in the other units while it is typed; silent as long as it cannot be read. */
function MassBeside({ form }: { form: WorthForm }) {
  const { weightUnit } = useReader();
  if (form.mass.trim() === '') return <>A dot or a comma, as you write it.</>;
  try {
    const grams = dec(parseMassText(form.mass)).times(GRAMS_PER_UNIT[form.massUnit]);
    return (
      <span className="flex flex-wrap gap-x-3">
        {massInUnits(grams, weightUnit)
          .filter(({ unit }) => unit !== form.massUnit)
          .map(({ unit, value, label }) => (
            <Quantity key={unit} value={value} unit={label} />
          ))}
      </span>
    );
  } catch (error) {
    if (error instanceof MeasureError) return <>{error.message}</>;
    throw error;
  }
}
