import { useMutation } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { sendAct, sendDeskAct } from '../api/send-act.ts';
import { actText } from '../deal-acts.ts';
import { counterpartyText } from '../../../components/figures/deal-words.ts';
import { useDealChanged, useDealReload } from '../hooks/use-deal-changed.ts';

type PanelProps = { deal: DealAnswer; onClose: () => void };
type SimpleActPanelProps = PanelProps & {
  title: string;
  counterparty: string;
  consequence: ReactNode;
  confirmText: string;
  said: string;
  send: () => Promise<DealAnswer>;
};

/** An act that needs nothing but a yes and moves no money. */
function SimpleActPanel({ deal, onClose, said, send, ...words }: SimpleActPanelProps) {
  const changed = useDealChanged(deal.code);
  const reload = useDealReload(deal.code);
  const act = useMutation({
    mutationFn: send,
    onSuccess: (answer) => changed(answer, said),
    onError: () => reload(),
  });
  return (
    <div className="mt-5">
      <ConfirmPanel
        {...words}
        sum={null}
        onConfirm={() => act.mutate()}
        onCancel={onClose}
        busy={act.isPending}
        problem={act.error?.message}
      />
    </div>
  );
}

export function ConfirmDeliveryPanel({ deal, onClose }: PanelProps) {
  return (
    <SimpleActPanel
      deal={deal}
      onClose={onClose}
      title="Has the parcel reached you?"
      counterparty={counterpartyText(deal)}
      consequence="The carrier has no signature. With your word it counts as delivered, and your days to inspect it begin. No money moves."
      confirmText={actText('confirmDelivery', deal)}
      said="Delivery confirmed."
      send={() => sendAct(deal.code, 'confirm-delivery')}
    />
  );
}

export function UnfreezePanel({ deal, onClose }: PanelProps) {
  return (
    <SimpleActPanel
      deal={deal}
      onClose={onClose}
      title="Lift the freeze?"
      counterparty="both sides of the deal"
      consequence="The clocks go on; a running deadline is moved by the length of the freeze."
      confirmText={actText('unfreeze', deal)}
      said="The freeze is lifted."
      send={() => sendDeskAct(deal.code, 'unfreeze')}
    />
  );
}
