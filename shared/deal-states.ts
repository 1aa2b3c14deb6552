import { assertChange, canChange, type TransitionTable } from './transitions.ts';

/** States of a deal, in the order of its life, then the side roads. */
export const DEAL_STATES = [
  'agreed',
  'funded',
  'shipped',
  'delivered',
  'accepted',
  'settled',
  'paid_out',
  'exchange',
  'umpire',
  'contested',
  'returning',
  'returned',
  'lapsed',
  'cancelled',
  'reversed',
] as const;

/** A state of a deal. */
export type DealState = (typeof DEAL_STATES)[number];

/** How a deal's state is worded. */
export const DEAL_STATE_LABELS: Readonly<Record<DealState, string>> = {
  agreed: 'Agreed',
  funded: 'Funded',
  shipped: 'Shipped',
  delivered: 'Delivered',
  accepted: 'Accepted',
  settled: 'Settled',
  paid_out: 'Paid out',
  exchange: 'Assays being exchanged',
  umpire: 'With the umpire',
  contested: 'Contested',
  returning: 'Coming back',
  returned: 'Returned and refunded',
  lapsed: 'Lapsed, not funded',
  cancelled: 'Cancelled and refunded',
  reversed: 'Payment reversed',
};

/** Which state may follow which. From funded on, until an end, a lost card dispute or debit return reverses the deal. */
export const DEAL_TRANSITIONS: TransitionTable<DealState> = {
  agreed: ['funded', 'lapsed'],
  funded: ['shipped', 'cancelled', 'reversed'],
  shipped: ['delivered', 'contested', 'reversed'],
  delivered: ['accepted', 'contested', 'exchange', 'reversed'],
  accepted: ['settled', 'reversed'],
  settled: ['paid_out', 'reversed'],
  paid_out: ['settled', 'reversed'],
  exchange: ['settled', 'umpire', 'contested', 'returning', 'reversed'],
  umpire: ['settled', 'contested', 'returning', 'reversed'],
  contested: ['settled', 'returning', 'cancelled', 'reversed'],
  returning: ['returned', 'contested', 'settled', 'reversed'],
  returned: [],
  lapsed: [],
  cancelled: [],
  reversed: [],
};

/** True when a deal may pass from one state to the other. */
export function canDealBecome(from: DealState, to: DealState): boolean {
  return canChange(DEAL_TRANSITIONS, from, to);
}

/** Refuses any other change. Throws MeasureError `illegal-transition`. */
export function assertDealTransition(from: DealState, to: DealState): void {
  assertChange(DEAL_TRANSITIONS, DEAL_STATE_LABELS, from, to);
}

/** True when nothing can follow. A paid-out deal has not ended: its payout may yet fail. */
export function isDealEnded(state: DealState): boolean {
  return DEAL_TRANSITIONS[state].length === 0;
}

/** States in which the buyer's money is held for the deal and nothing has gone to the seller. */
export const HOLDING_DEAL_STATES: readonly DealState[] = [
  'funded',
  'shipped',
  'delivered',
  'accepted',
  'exchange',
  'umpire',
  'contested',
  'returning',
];
