import { useState, type SubmitEvent } from 'react';
import { COUNTRY_CODES } from '#shared/countries.ts';
import { MASS_UNIT_LABELS } from '#shared/mass.ts';
import { READING_UNITS, type ReadingUnit } from '#shared/mass-in-units.ts';
import { Button } from '../../../components/ui/button.tsx';
import { useErrorTitle } from '../../../components/ui/error-summary.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput, Select } from '../../../components/ui/inputs.tsx';
import { countriesByName } from '../../../lib/countries.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { BOUND_FIELDS, BOUND_NAMES, type BoundField, type RegisterFilters } from '../register-filters.ts';
import { readBounds, type BoundErrors, type TypedBounds } from '../typed-bounds.ts';

type RegisterBoundsProps = { filters: RegisterFilters; onApply: (filters: RegisterFilters) => void };

const countries = countriesByName(COUNTRY_CODES);

const fields: { field: BoundField; label: string; unit: string | null }[] = [
  { field: 'finenessFrom', label: 'Fineness from', unit: '‰' },
  { field: 'finenessTo', label: 'Fineness to', unit: '‰' },
  { field: 'percentFrom', label: 'Price from', unit: '% of melt' },
  { field: 'percentTo', label: 'Price to', unit: '% of melt' },
  { field: 'contentFrom', label: 'Fine content from', unit: null },
  { field: 'contentTo', label: 'Fine content to', unit: null },
];

function boundsOf(filters: RegisterFilters): TypedBounds {
  return Object.fromEntries(BOUND_FIELDS.map((field) => [field, filters[field]])) as TypedBounds;
}

/** Ranges and destination; applied together, by Enter or the button, once they can be read. */
export function RegisterBounds({ filters, onApply }: RegisterBoundsProps) {
  const { weightUnit } = useReader();
  const [typed, setTyped] = useState(() => boundsOf(filters));
  const [unit, setUnit] = useState<ReadingUnit>(filters.contentUnit ?? weightUnit);
  const [destination, setDestination] = useState(filters.destination);
  const [errors, setErrors] = useState<BoundErrors>({});
  useErrorTitle(Object.keys(errors).length > 0);

  const apply = (event: SubmitEvent) => {
    event.preventDefault();
    const read = readBounds(typed);
    setErrors(read.errors);
    const firstWrong = BOUND_FIELDS.find((field) => read.errors[field]);
    if (firstWrong) document.getElementById(BOUND_NAMES[firstWrong])?.focus();
    else onApply({ ...filters, ...read.bounds, contentUnit: unit, destination });
  };

  const isKnown = destination === '' || COUNTRY_CODES.includes(destination);
  return (
    <form
      noValidate
      onSubmit={apply}
      aria-label="Ranges and destination"
      className="grid grid-cols-2 items-end gap-4 pt-3 lg:grid-cols-4"
    >
      {fields.map(({ field, label, unit: fixedUnit }) => (
        <Field
          key={field}
          id={BOUND_NAMES[field]}
          label={`${label}, ${fixedUnit ?? MASS_UNIT_LABELS[unit]}`}
          error={errors[field]}
        >
          {(ties) => (
            <NumberInput
              {...ties}
              aria-required={undefined}
              value={typed[field]}
              onChange={(event) => setTyped({ ...typed, [field]: event.target.value })}
            />
          )}
        </Field>
      ))}
      <Field id="content-unit" label="Unit of fine content">
        {(ties) => (
          <Select {...ties} value={unit} onChange={(event) => setUnit(event.target.value as ReadingUnit)}>
            {READING_UNITS.map((key) => (
              <option key={key} value={key}>
                {MASS_UNIT_LABELS[key]}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field id="ships-to" label="Ships to">
        {(ties) => (
          <Select
            {...ties}
            aria-required={undefined}
            value={destination}
            onChange={(event) => setDestination(event.target.value)}
          >
            <option value="">anywhere</option>
            {!isKnown && <option value={destination}>{destination}</option>}
            {countries.map(({ code, name }) => (
              <option key={code} value={code}>
                {name}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <div className="col-span-2 lg:col-span-4">
        <Button type="submit" look="second">
          Show lots within these
        </Button>
      </div>
    </form>
  );
}
