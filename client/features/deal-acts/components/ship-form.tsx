import { shipRequest, type DealAnswer, type ShipRequest } from '#shared/schemas/deals.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { typedDecimal } from '#shared/typed-number.ts';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput, TextInput } from '../../../components/ui/inputs.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { readBy, useForm, type Reading } from '../../../lib/use-form.ts';
import { sendAct } from '../api/send-act.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';
import { ActPanel } from './act-panel.tsx';

type Values = { carrier: string; trackingNumber: string; insuredValue: string };

function readShipping(values: Values): Reading<ShipRequest> {
  const { input, faults } = readBy(shipRequest, { ...values, insuredValue: '0' });
  const insured = readInsured(values.insuredValue);
  if (faults === null && insured.value !== null)
    return { input: { ...input, insuredValue: insured.value }, faults: null };
  return { input: null, faults: [...(faults ?? []), ...insured.faults] };
}

function readInsured(text: string): { value: string | null; faults: { pointer: string; message: string }[] } {
  try {
    return { value: typedDecimal(text, '/insuredValue', 'Enter the insured value.'), faults: [] };
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    return {
      value: null,
      faults: error.issues.map(({ message }) => ({ pointer: '/insuredValue', message })),
    };
  }
}

type ShipFormProps = { deal: DealAnswer; onClose: () => void };

/** The seller tells what was handed to the carrier. */
export function ShipForm({ deal, onClose }: ShipFormProps) {
  const changed = useDealChanged(deal.code);
  const form = useForm({
    initial: { carrier: '', trackingNumber: '', insuredValue: deal.price.amount } as Values,
    read: readShipping,
    send: (input) => sendAct(deal.code, 'ship', input),
    onDone: (answer) => changed(answer, 'The buyer is told that the parcel is on its way.'),
    onRefused: useDealReload(deal.code),
  });
  return (
    <ActPanel
      title="The parcel you shipped"
      form={form}
      submitText="Tell the buyer it is shipped"
      busyText="Telling the carrier and the buyer"
      onClose={onClose}
    >
      <p className="max-w-prose text-ink-2">
        Ask for delivery against signature: you bear the risk until then. Never post acids, wet residues or
        anything the carrier excludes; many carriers limit or exclude precious metal. Check your local rules;
        this is not legal advice.
      </p>
      <Field id={form.fieldId('carrier')} label="Carrier" error={form.errorOf('carrier')}>
        {(ties) => (
          <TextInput
            {...ties}
            autoComplete="off"
            value={form.values.carrier}
            onChange={(event) => form.set('carrier', event.target.value)}
          />
        )}
      </Field>
      <Field
        id={form.fieldId('trackingNumber')}
        label="Tracking number"
        hint="Letters and digits as on the receipt. It is followed from now on."
        error={form.errorOf('trackingNumber')}
      >
        {(ties) => (
          <TextInput
            {...ties}
            autoComplete="off"
            className="font-mono"
            value={form.values.trackingNumber}
            onChange={(event) => form.set('trackingNumber', event.target.value)}
          />
        )}
      </Field>
      <Field
        id={form.fieldId('insuredValue')}
        label="Insured value"
        hint={`At least the price of the metal, ${formatMoney(deal.price.amount)}.`}
        error={form.errorOf('insuredValue')}
        className="max-w-xs"
      >
        {(ties) => (
          <NumberInput
            {...ties}
            unit="US$"
            value={form.values.insuredValue}
            onChange={(event) => form.set('insuredValue', event.target.value)}
          />
        )}
      </Field>
    </ActPanel>
  );
}
