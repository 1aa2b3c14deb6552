import { useMutation } from '@tanstack/react-query';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { useAttemptKey } from '../../../lib/use-attempt-key.ts';
import { acceptDeal } from '../api/accept-deal.ts';
import { actText } from '../deal-acts.ts';
import { counterpartyText } from '../../../components/figures/deal-words.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';

type PanelProps = { deal: DealAnswer; onClose: () => void };

/** The last word of a deal: the whole of what is held leaves escrow. */
export function AcceptPanel({ deal, onClose }: PanelProps) {
  const attempt = useAttemptKey();
  const changed = useDealChanged(deal.code);
  const reload = useDealReload(deal.code);
  const accept = useMutation({
    mutationFn: () => acceptDeal(deal.code, attempt.keyFor({ accept: deal.code })),
    onSuccess: (answer) => changed(answer, `Accepted: ${formatMoney(deal.held.amount)} is released.`),
    onError: (error) => {
      attempt.settle(error);
      return reload();
    },
  });
  return (
    <div className="mt-5">
      <ConfirmPanel
        title="Accept the lot as it arrived?"
        sum={<Money value={deal.held.amount} />}
        counterparty={counterpartyText(deal)}
        consequence={
          <>
            {deal.receipt?.isWithinScales === false && (
              <p className="font-medium text-litharge">
                The mass you recorded lies outside what both scales can tell apart. Accepting settles the deal
                at the stated mass all the same.
              </p>
            )}
            <p>
              The whole sum leaves escrow for the seller, who bears the house’s commission. This is final: it
              cannot be contested afterwards.
            </p>
          </>
        }
        confirmText={actText('accept', deal)}
        onConfirm={() => accept.mutate()}
        onCancel={onClose}
        busy={accept.isPending}
        problem={accept.error?.message}
      />
    </div>
  );
}
