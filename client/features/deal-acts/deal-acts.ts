import type { DealAnswer } from '#shared/schemas/deals.ts';
import { formatMoney } from '../../lib/format.ts';

export type DealAct = keyof DealAnswer['can'];

/** The order in which acts are offered: what moves the deal on first. */
const ORDER: readonly DealAct[] = [
  'pay',
  'ship',
  'confirmDelivery',
  'recordReceipt',
  'accept',
  'rule',
  'takeUp',
  'contest',
  'unfreeze',
  'freeze',
];

/** What this reader may do now; the server decided it. */
export function openActs(deal: Pick<DealAnswer, 'can'>): DealAct[] {
  return ORDER.filter((act) => deal.can[act]);
}

/** What a button for the act says. */
export function actText(act: DealAct, deal: DealAnswer): string {
  switch (act) {
    case 'pay':
      return `Pay ${formatMoney(deal.total.amount)} into escrow`;
    case 'ship':
      return 'Enter the parcel you shipped';
    case 'confirmDelivery':
      return 'Confirm the delivery';
    case 'recordReceipt':
      return 'Record the received mass';
    case 'accept':
      return `Accept: ${formatMoney(deal.held.amount)} to the seller`;
    case 'rule':
      return 'Rule on the deal';
    case 'takeUp':
      return 'Take up the deal';
    case 'contest':
      return 'Contest';
    case 'unfreeze':
      return 'Lift the freeze';
    case 'freeze':
      return 'Freeze the deal';
  }
}
