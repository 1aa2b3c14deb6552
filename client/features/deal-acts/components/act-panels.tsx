import type { ComponentType } from 'react';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import type { DealAct } from '../deal-acts.ts';
import { AcceptPanel } from './accept-panel.tsx';
import { ContestForm } from './contest-form.tsx';
import { FreezeForm } from './freeze-form.tsx';
import { PayPanel } from './pay-panel.tsx';
import { ReceiptForm } from './receipt-form.tsx';
import { RulingForm } from './ruling-form.tsx';
import { ShipForm } from './ship-form.tsx';
import { ConfirmDeliveryPanel, UnfreezePanel } from './simple-act-panel.tsx';
import { TakeUpForm } from './take-up-form.tsx';

type PanelProps = { deal: DealAnswer; onClose: () => void };

const panels: Record<DealAct, ComponentType<PanelProps>> = {
  pay: PayPanel,
  ship: ShipForm,
  confirmDelivery: ConfirmDeliveryPanel,
  recordReceipt: ReceiptForm,
  accept: AcceptPanel,
  contest: ContestForm,
  rule: RulingForm,
  takeUp: TakeUpForm,
  freeze: FreezeForm,
  unfreeze: UnfreezePanel,
};

/** The panel of the act that was chosen. */
export function OpenAct({ act, ...props }: PanelProps & { act: DealAct }) {
  const Panel = panels[act];
  return <Panel {...props} />;
}
