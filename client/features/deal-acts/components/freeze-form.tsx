import type { DealAnswer } from '#shared/schemas/deals.ts';
import { reasonRequest } from '#shared/schemas/lots.ts';
import { Money } from '../../../components/figures/money.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea } from '../../../components/ui/inputs.tsx';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { sendDeskAct } from '../api/send-act.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';
import { ActPanel } from './act-panel.tsx';

type FreezeFormProps = { deal: DealAnswer; onClose: () => void };

export function FreezeForm({ deal, onClose }: FreezeFormProps) {
  const changed = useDealChanged(deal.code);
  const form = useForm({
    initial: { reason: '' },
    read: (values) => readBy(reasonRequest, values),
    send: (input) => sendDeskAct(deal.code, 'freeze', input),
    onDone: (answer) => changed(answer, 'The deal is frozen.'),
    onRefused: useDealReload(deal.code),
  });
  return (
    <ActPanel
      title="Freeze the deal"
      form={form}
      submitText="Freeze"
      busyText="Freezing"
      look="danger"
      onClose={onClose}
      confirm={{
        title: 'Freeze this deal?',
        sum: <Money value={deal.held.amount} />,
        counterparty: 'both sides of the deal',
        consequence:
          'The sum stays held, and every clock of the deal stands still until the freeze is lifted.',
        confirmText: 'Freeze the deal',
        danger: true,
      }}
    >
      <Field
        id={form.fieldId('reason')}
        label="Reason"
        hint="Both sides read it in the register of the deal."
        error={form.errorOf('reason')}
      >
        {(ties) => (
          <Textarea
            {...ties}
            rows={3}
            value={form.values.reason}
            onChange={(event) => form.set('reason', event.target.value)}
          />
        )}
      </Field>
    </ActPanel>
  );
}
