import { rulingRequest, type DealAnswer, type RulingRequest } from '#shared/schemas/deals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { Field, Fieldset } from '../../../components/ui/field.tsx';
import { RadioGroup, Textarea } from '../../../components/ui/inputs.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { useAttemptKey } from '../../../lib/use-attempt-key.ts';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { ruleDeal } from '../api/rule-deal.ts';
import { counterpartyText } from '../../../components/figures/deal-words.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';
import { ActPanel } from './act-panel.tsx';

/** Who gets what, for each ruling. */
function outcomeOf(deal: DealAnswer, ruling: RulingRequest['ruling']) {
  const held = formatMoney(deal.held.amount);
  if (ruling === 'refund')
    return {
      sum: <Money value={deal.held.amount} />,
      counterparty: `the buyer, ${counterpartyText(deal)}`,
      confirmText: `Rule: ${held} back to the buyer`,
      consequence: `Everything held, ${held}, goes back to the buyer. The seller gets nothing.`,
    };
  const net = deal.commission?.net.amount ?? deal.held.amount;
  const commission = deal.commission?.amount.amount;
  return {
    sum: <Money value={net} />,
    counterparty: 'the seller',
    confirmText: `Rule: ${formatMoney(net)} to the seller`,
    consequence: `Of ${held} held, ${formatMoney(net)} goes to the seller${
      commission ? ` and ${formatMoney(commission)} is the house’s commission` : ''
    }. The buyer gets nothing back.`,
  };
}

type RulingFormProps = { deal: DealAnswer; onClose: () => void };

/** The desk ends a contested deal: everything back, or everything on. */
export function RulingForm({ deal, onClose }: RulingFormProps) {
  const attempt = useAttemptKey();
  const changed = useDealChanged(deal.code);
  const reload = useDealReload(deal.code);
  const form = useForm({
    initial: { ruling: '', reason: '' },
    read: (values) => readBy(rulingRequest, values),
    send: (input) => ruleDeal(deal.code, input, attempt.keyFor(input)),
    onDone: (answer) => changed(answer, 'Ruled: both sides get the reason by mail.'),
    onRefused: (error) => {
      attempt.settle(error);
      return reload();
    },
  });
  const outcome = outcomeOf(deal, form.asked?.ruling ?? 'refund');
  return (
    <ActPanel
      title="Rule on the deal"
      form={form}
      submitText="Look at the ruling before it counts"
      busyText="Ruling"
      onClose={onClose}
      confirm={{
        title: 'Give this ruling?',
        ...outcome,
        consequence: (
          <>
            <p>{outcome.consequence}</p>
            <p className="mt-1">It is final, and both sides read the reason: “{form.asked?.reason}”</p>
          </>
        ),
      }}
    >
      <Fieldset id={form.fieldId('ruling')} legend="What is the ruling?" error={form.errorOf('ruling')}>
        <RadioGroup
          id={`${form.fieldId('ruling')}-choice`}
          name={form.fieldId('ruling')}
          value={form.values.ruling}
          options={[
            {
              value: 'refund',
              label: 'Refund in full',
              hint: `${formatMoney(deal.held.amount)} back to the buyer.`,
            },
            { value: 'release', label: 'Release', hint: outcomeOf(deal, 'release').consequence },
          ]}
          onChange={(event) => form.set('ruling', event.target.value)}
        />
      </Fieldset>
      <Field
        id={form.fieldId('reason')}
        label="Reason for both sides"
        hint="It stands in the register of the deal and in both mails."
        error={form.errorOf('reason')}
      >
        {(ties) => (
          <Textarea
            {...ties}
            value={form.values.reason}
            onChange={(event) => form.set('reason', event.target.value)}
          />
        )}
      </Field>
    </ActPanel>
  );
}
