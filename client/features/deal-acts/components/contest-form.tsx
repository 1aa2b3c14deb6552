import { CONTEST_REASONS, contestRequest, type DealAnswer } from '#shared/schemas/deals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { Field, Fieldset } from '../../../components/ui/field.tsx';
import { RadioGroup, Textarea } from '../../../components/ui/inputs.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { sendAct } from '../api/send-act.ts';
import { contestReasons, counterpartyText } from '../../../components/figures/deal-words.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';
import { ActPanel } from './act-panel.tsx';

type ContestFormProps = { deal: DealAnswer; onClose: () => void };

/** The buyer says what is wrong; the money stays where it is. */
export function ContestForm({ deal, onClose }: ContestFormProps) {
  const changed = useDealChanged(deal.code);
  const form = useForm({
    initial: { reason: '', note: '' },
    read: (values) => readBy(contestRequest, values),
    send: (input) => sendAct(deal.code, 'contest', input),
    onDone: (answer) => changed(answer, 'Contested: the desk has been told.'),
    onRefused: useDealReload(deal.code),
  });
  return (
    <ActPanel
      title="Contest the deal"
      form={form}
      submitText="Contest"
      busyText="Telling the desk"
      look="danger"
      onClose={onClose}
      confirm={{
        title: 'Contest this deal?',
        sum: <Money value={deal.held.amount} />,
        counterparty: counterpartyText(deal),
        consequence:
          'The sum stays held. The desk hears both sides and rules: all of it back to you, or all of it to the seller. Keep the lot as it is until then: do not melt, clean or sample it.',
        confirmText: `Contest: ${formatMoney(deal.held.amount)} stays held`,
        danger: true,
      }}
    >
      <Fieldset id={form.fieldId('reason')} legend="What is wrong?" error={form.errorOf('reason')}>
        <RadioGroup
          id={`${form.fieldId('reason')}-choice`}
          name={form.fieldId('reason')}
          value={form.values.reason}
          options={CONTEST_REASONS.map((value) => ({ value, ...contestReasons[value] }))}
          onChange={(event) => form.set('reason', event.target.value)}
        />
      </Fieldset>
      <Field
        id={form.fieldId('note')}
        label="What did you find?"
        hint="Seller and desk read it. Say what you saw, weighed or measured, and with what."
        error={form.errorOf('note')}
      >
        {(ties) => (
          <Textarea
            {...ties}
            value={form.values.note}
            onChange={(event) => form.set('note', event.target.value)}
          />
        )}
      </Field>
    </ActPanel>
  );
}
