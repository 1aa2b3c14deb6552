import { Field } from '../../../components/ui/field.tsx';
import { Select, TextInput } from '../../../components/ui/inputs.tsx';
import { countriesByName } from '../../../lib/countries.ts';
import type { AddressField, FieldErrors, PurchaseForm } from '../purchase-form.ts';

type DeliveryFieldsProps = {
  delivery: PurchaseForm['delivery'];
  destinations: string[];
  errors: FieldErrors;
  onChange: (field: AddressField, value: string) => void;
};

type TextField = {
  field: AddressField;
  label: string;
  hint?: string;
  autoComplete: string;
  type?: string;
  optional?: boolean;
  isWide?: boolean;
};

const textFields: TextField[] = [
  { field: 'name', label: 'Name of who receives it', autoComplete: 'shipping name', isWide: true },
  { field: 'line1', label: 'Street and number', autoComplete: 'shipping address-line1', isWide: true },
  {
    field: 'line2',
    label: 'Flat, floor or care of',
    autoComplete: 'shipping address-line2',
    optional: true,
    isWide: true,
  },
  { field: 'postcode', label: 'Postcode', autoComplete: 'shipping postal-code' },
  { field: 'city', label: 'Town', autoComplete: 'shipping address-level2' },
  { field: 'region', label: 'Region or state', autoComplete: 'shipping address-level1' },
];

/** Where the parcel goes; once agreed it is frozen into the deal. */
export function DeliveryFields({ delivery, destinations, errors, onChange }: DeliveryFieldsProps) {
  const control = (item: TextField) => {
    const id = `delivery-${item.field}`;
    return (
      <Field
        key={item.field}
        id={id}
        label={item.label}
        hint={item.hint}
        error={errors[id]}
        optional={item.optional ?? false}
        className={item.isWide ? 'sm:col-span-2' : undefined}
      >
        {(ties) => (
          <TextInput
            {...ties}
            type={item.type ?? 'text'}
            autoComplete={item.autoComplete}
            value={delivery[item.field]}
            onChange={(event) => onChange(item.field, event.target.value)}
          />
        )}
      </Field>
    );
  };
  return (
    <div className="grid gap-4 sm:grid-cols-2">
      {textFields.map(control)}
      <Field
        id="delivery-country"
        label="Country"
        hint="Only where the seller ships to."
        error={errors['delivery-country']}
      >
        {(ties) => (
          <Select
            {...ties}
            autoComplete="shipping country"
            value={delivery.country}
            onChange={(event) => onChange('country', event.target.value)}
          >
            <option value="">Choose a country</option>
            {countriesByName(destinations).map(({ code, name }) => (
              <option key={code} value={code}>
                {name}
              </option>
            ))}
          </Select>
        )}
      </Field>
      {control({
        field: 'phone',
        label: 'Telephone',
        hint: 'For the carrier, who needs a signature.',
        autoComplete: 'shipping tel',
        type: 'tel',
        isWide: true,
      })}
    </div>
  );
}
