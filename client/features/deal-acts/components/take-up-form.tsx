import { takeUpRequest, type DealAnswer } from '#shared/schemas/deals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea } from '../../../components/ui/inputs.tsx';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { sendDeskAct } from '../api/send-act.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';
import { ActPanel } from './act-panel.tsx';

type TakeUpFormProps = { deal: DealAnswer; onClose: () => void };

/** The desk takes a delivered deal out of the silence of its buyer. */
export function TakeUpForm({ deal, onClose }: TakeUpFormProps) {
  const changed = useDealChanged(deal.code);
  const form = useForm({
    initial: { reason: '' },
    read: (values) => readBy(takeUpRequest, values),
    send: (input) => sendDeskAct(deal.code, 'take-up', input),
    onDone: (answer) => changed(answer, 'Taken up: both sides are told by mail.'),
    onRefused: useDealReload(deal.code),
  });
  return (
    <ActPanel
      title="Take up the deal"
      form={form}
      submitText="Take it up"
      busyText="Taking it up"
      onClose={onClose}
      confirm={{
        title: 'Take up this deal?',
        sum: <Money value={deal.held.amount} />,
        counterparty: 'both sides of the deal',
        consequence:
          'The sum stays held. The buyer can no longer accept or contest; the desk rules, for a refund in full or for release.',
        confirmText: 'Take up the deal',
      }}
    >
      <Field
        id={form.fieldId('reason')}
        label="Reason for both sides"
        hint="It stands in the register of the deal and in both mails. Say how the buyer was asked."
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
