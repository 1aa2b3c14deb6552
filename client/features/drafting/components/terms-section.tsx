import { dayOf, daysLater } from '#shared/calendar-day.ts';
import { LOT_OPEN_DAYS_MAX } from '#shared/limits.ts';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput, TextInput } from '../../../components/ui/inputs.tsx';
import { useNow } from '../../../lib/use-now.ts';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { DestinationPicker } from './destination-picker.tsx';
import { PricingFields } from './pricing-fields.tsx';
import { FormSection } from '../../../components/lot-form/form-section.tsx';

/** What the buyer pays, where the parcel goes, how long the lot is open. */
export function TermsSection() {
  const { draft, change, errorAt } = useDraftForm();
  const now = new Date(useNow(60_000));
  return (
    <FormSection
      id="section-terms"
      title="Price, parcel and time"
      sub="A fixed sum for the metal, or a share of its melt value. It can change while the lot is open, never once a buyer has agreed."
    >
      <PricingFields />
      <div className="grid grid-cols-1 items-start gap-6 sm:grid-cols-2">
        <Field
          id={fieldIdOf('/shipping')}
          label="Insured parcel, US$"
          hint="What the buyer pays for it; 0 if you bear it. Insure for the full price."
          error={errorAt('/shipping')}
        >
          {(ties) => (
            <NumberInput
              {...ties}
              maxLength={20}
              value={draft.shipping}
              onChange={({ target: { value } }) => change((before) => ({ ...before, shipping: value }))}
            />
          )}
        </Field>
      </div>
      <DestinationPicker />
      <Field
        id={fieldIdOf('/closesOn')}
        label="Last day on the register"
        optional
        hint={`Left out: ${LOT_OPEN_DAYS_MAX} days from the day on which the desk opens it, which is also the longest. The day ends at midnight UTC.`}
        error={errorAt('/closesOn')}
      >
        {(ties) => (
          <TextInput
            {...ties}
            type="date"
            min={dayOf(daysLater(now, 1))}
            max={dayOf(daysLater(now, LOT_OPEN_DAYS_MAX))}
            value={draft.closesOn}
            onChange={({ target: { value } }) => change((before) => ({ ...before, closesOn: value }))}
            className="max-w-56"
          />
        )}
      </Field>
    </FormSection>
  );
}
