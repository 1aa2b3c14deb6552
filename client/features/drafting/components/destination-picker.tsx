import { COUNTRY_CODES } from '#shared/countries.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Fieldset } from '../../../components/ui/field.tsx';
import { Checkbox, Select } from '../../../components/ui/inputs.tsx';
import { countriesByName, countryName } from '../../../lib/countries.ts';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';

const COMMON = ['US', 'CA', 'GB', 'IE', 'DE', 'FR', 'NL', 'CH', 'AU', 'NZ', 'JP', 'SG'];
const others = countriesByName(COUNTRY_CODES.filter((code) => !COMMON.includes(code)));
const DESTINATIONS_MAX = 60;

/** Where the seller ships: the common ones to tick, every other to add. */
export function DestinationPicker() {
  const { draft, change, errorAt } = useDraftForm();
  const chosen = draft.destinations;
  const add = (code: string) => {
    if (code === '' || chosen.includes(code) || chosen.length >= DESTINATIONS_MAX) return;
    change((before) => ({ ...before, destinations: [...before.destinations, code] }));
  };
  const remove = (code: string) =>
    change((before) => ({ ...before, destinations: before.destinations.filter((other) => other !== code) }));
  const added = chosen.filter((code) => !COMMON.includes(code));
  const id = fieldIdOf('/destinations');
  return (
    <Fieldset
      id={id}
      legend="You ship to"
      hint="A buyer elsewhere cannot agree to this lot."
      error={errorAt('/destinations')}
    >
      <div className="mt-2 grid gap-x-6 gap-y-2 sm:grid-cols-2 lg:grid-cols-3">
        {COMMON.map((code) => (
          <Checkbox
            key={code}
            id={`${id}-${code}`}
            label={countryName(code)}
            checked={chosen.includes(code)}
            onChange={(event) => (event.target.checked ? add(code) : remove(code))}
          />
        ))}
      </div>
      <div className="mt-3 max-w-80">
        <label htmlFor={`${id}-more`} className="text-note font-medium">
          Another country
        </label>
        <Select id={`${id}-more`} value="" onChange={(event) => add(event.target.value)}>
          <option value="">Choose one to add it</option>
          {others
            .filter((country) => !chosen.includes(country.code))
            .map((country) => (
              <option key={country.code} value={country.code}>
                {country.name}
              </option>
            ))}
        </Select>
      </div>
      {added.length > 0 && (
        <ul aria-label="Other countries chosen" className="mt-2 flex flex-wrap gap-x-5 gap-y-1">
          {added.map((code) => (
            <li key={code} className="flex items-center gap-1">
              {countryName(code)}
              <Button look="quiet" className="min-h-8 py-1 text-note" onClick={() => remove(code)}>
                Remove<span className="sr-only"> {countryName(code)}</span>
              </Button>
            </li>
          ))}
        </ul>
      )}
    </Fieldset>
  );
}
