import { MASS_UNIT_LABELS, MASS_UNITS, type MassEntry, type MassUnit } from '#shared/mass.ts';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Mass } from '../../../components/figures/mass.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput, Select } from '../../../components/ui/inputs.tsx';
import { useReader } from '../../../lib/reader-context.ts';
import { useForm } from '../../../lib/use-form.ts';
import { sendAct } from '../api/send-act.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';
import { readReceipt, readReceivedMass, type ReceivedValues } from '../read-received-mass.ts';
import { useReceiptPhoto } from '../hooks/use-receipt-photo.ts';
import { ActPanel } from './act-panel.tsx';
import { ReceiptPhotoField } from './receipt-photo-field.tsx';
import { ScalesAgree } from './scales-agree.tsx';

type ReceiptFormProps = { deal: DealAnswer; onClose: () => void };

/** The buyer's own weighing, recorded once and as typed. */
export function ReceiptForm({ deal, onClose }: ReceiptFormProps) {
  const changed = useDealChanged(deal.code);
  const { weightUnit } = useReader();
  const photo = useReceiptPhoto(deal.code);
  const form = useForm({
    initial: { mass: '', unit: weightUnit, photoFileId: '' } as ReceivedValues,
    read: (values) => readReceipt(values, photo),
    send: (input) => sendAct(deal.code, 'receipt', input),
    onDone: (answer) => changed(answer, 'The received mass is recorded.'),
    onRefused: useDealReload(deal.code),
  });
  const typed = readReceivedMass(form.values);
  const unitId = form.fieldId('unit');
  return (
    <ActPanel
      title="The mass you received"
      form={form}
      submitText="Record this mass"
      busyText="Recording"
      onClose={onClose}
      confirm={{
        title: 'Record this mass?',
        sum: null,
        counterparty: 'the seller and the desk, who see it in the register',
        consequence: form.asked && (
          <p>
            You weighed <Mass entry={form.asked.mass} others />
            {form.asked.photoFileId === null ? ', without a photo' : ', with your photo'}. It is recorded once
            and cannot be changed; it moves no money.
          </p>
        ),
        confirmText: 'Record the received mass',
      }}
    >
      <p className="max-w-prose text-ink-2">
        Weigh it before you clean, melt or sample it, and type every digit your balance shows: the last digit
        says how finely it reads. Buttons and powders can hold residual acid: keep them off skin and steel,
        and check your local rules. The lot states{' '}
        <Mass entry={{ value: deal.lot.gross.value, unit: deal.lot.gross.unit as MassUnit }} others />
      </p>
      <div className="flex max-w-md flex-wrap items-start gap-3">
        <Field
          id={form.fieldId('mass')}
          label="Received mass"
          error={form.errorOf('mass')}
          className="min-w-40 grow basis-40"
          beside={typed.input && <OtherUnits entry={typed.input} />}
        >
          {(ties) => (
            <NumberInput
              {...ties}
              value={form.values.mass}
              onChange={(event) => form.set('mass', event.target.value)}
            />
          )}
        </Field>
        <Field id={unitId} label="Unit" error={form.errorOf('unit')} className="w-28">
          {(ties) => (
            <Select
              {...ties}
              value={form.values.unit}
              onChange={(event) => form.set('unit', event.target.value)}
            >
              {MASS_UNITS.map((unit) => (
                <option key={unit} value={unit}>
                  {MASS_UNIT_LABELS[unit]}
                </option>
              ))}
            </Select>
          )}
        </Field>
      </div>
      <ScalesAgree lot={deal.lot} typed={typed.input} />
      <ReceiptPhotoField id={form.fieldId('photoFileId')} photo={photo} error={form.errorOf('photoFileId')} />
    </ActPanel>
  );
}

function OtherUnits({ entry }: { entry: MassEntry }) {
  return <Mass entry={entry} others />;
}
