import type { DealAnswer } from '#shared/schemas/deals.ts';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { actText } from '../deal-acts.ts';
import { counterpartyText } from '../../../components/figures/deal-words.ts';
import { usePay } from '../hooks/use-pay.ts';

type PanelProps = { deal: DealAnswer; onClose: () => void };

export function PayPanel({ deal, onClose }: PanelProps) {
  const pay = usePay(deal.code);
  return (
    <div className="mt-5">
      <ConfirmPanel
        title="Pay into escrow?"
        sum={<Money value={deal.total.amount} />}
        counterparty={`${counterpartyText(deal)}; held by Scruple until you accept`}
        consequence="You go on to the payment provider’s page. Nothing is held until the provider itself confirms the payment."
        confirmText={actText('pay', deal)}
        onConfirm={() => pay.mutate()}
        onCancel={onClose}
        busy={pay.isPending || pay.isSuccess}
        problem={pay.error?.message}
      />
    </div>
  );
}
