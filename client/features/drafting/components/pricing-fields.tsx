import { Field, Fieldset } from '../../../components/ui/field.tsx';
import { NumberInput, RadioGroup } from '../../../components/ui/inputs.tsx';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { PRICE_FIX_MINUTES } from '#shared/limits.ts';

const BASES = [
  { value: 'outright', label: 'A fixed sum', hint: 'It stays as it is while the metal moves.' },
  {
    value: 'linked',
    label: 'A share of melt',
    hint: `It follows the quote. A buyer fixes it to a sum at one quote and has ${PRICE_FIX_MINUTES} minutes to agree.`,
  },
];

/** How the lot is priced; what was typed for the other basis is kept, and does not count. */
export function PricingFields() {
  const { draft, change, errorAt } = useDraftForm();
  const isLinked = draft.pricing === 'linked';
  return (
    <>
      <Fieldset id={fieldIdOf('/pricing')} legend="How it is priced" error={errorAt('/pricing')}>
        <RadioGroup
          id={fieldIdOf('/pricing')}
          name="pricing"
          options={BASES}
          value={isLinked ? 'linked' : 'outright'}
          onChange={({ target: { value } }) => change((before) => ({ ...before, pricing: value }))}
        />
      </Fieldset>
      {isLinked ? (
        <PercentField
          pointer="/linkedPercent"
          label="Share of melt, %"
          hint="Of the melt value at the quote of the moment, such as 98.20."
        />
      ) : (
        <div className="grid grid-cols-1 items-start gap-6 sm:grid-cols-2">
          <Field id={fieldIdOf('/price')} label="Price of the metal, US$" error={errorAt('/price')}>
            {(ties) => (
              <NumberInput
                {...ties}
                maxLength={20}
                value={draft.price}
                onChange={({ target: { value } }) => change((before) => ({ ...before, price: value }))}
              />
            )}
          </Field>
          <PercentField
            pointer="/floorPercent"
            label="Floor, % of melt"
            optional
            hint="When the metal rises so far that your price falls below this share, the lot pauses and you are told."
          />
        </div>
      )}
    </>
  );
}

type PercentFieldProps = {
  pointer: '/linkedPercent' | '/floorPercent';
  label: string;
  hint: string;
  optional?: boolean;
};

function PercentField({ pointer, label, hint, optional = false }: PercentFieldProps) {
  const { draft, change, errorAt } = useDraftForm();
  const key = pointer === '/linkedPercent' ? 'linkedPercent' : 'floorPercent';
  return (
    <Field id={fieldIdOf(pointer)} label={label} hint={hint} optional={optional} error={errorAt(pointer)}>
      {(ties) => (
        <NumberInput
          {...ties}
          unit="%"
          maxLength={20}
          value={draft[key]}
          onChange={({ target: { value } }) => change((before) => ({ ...before, [key]: value }))}
        />
      )}
    </Field>
  );
}
