import { assertChange, canChange, type TransitionTable } from './transitions.ts';

/** States of a lot, in the order of its life. */
export const LOT_STATES = [
  'draft',
  'submitted',
  'returned',
  'open',
  'paused',
  'reserved',
  'sold',
  'closed',
  'withdrawn',
] as const;

/** A state of a lot. */
export type LotState = (typeof LOT_STATES)[number];

/** How a lot's state is worded. */
export const LOT_STATE_LABELS: Readonly<Record<LotState, string>> = {
  draft: 'Draft',
  submitted: 'With the desk',
  returned: 'Returned by the desk',
  open: 'Open',
  paused: 'Paused',
  reserved: 'Reserved',
  sold: 'Sold',
  closed: 'Closed',
  withdrawn: 'Withdrawn',
};

/**
 * Which state may follow which. A reserved lot is sold when its deal is funded and opens again when the purchase
 * lapses; a cancelled or returned deal closes a sold lot. The desk pulls a lot by withdrawing it, with a reason.
 */
export const LOT_TRANSITIONS: TransitionTable<LotState> = {
  draft: ['submitted'],
  submitted: ['open', 'returned', 'withdrawn'],
  returned: ['draft'],
  open: ['reserved', 'closed', 'withdrawn', 'paused'],
  paused: ['open', 'closed', 'withdrawn'],
  reserved: ['sold', 'open'],
  sold: ['closed'],
  closed: [],
  withdrawn: [],
};

/** True when a lot may pass from one state to the other. */
export function canLotBecome(from: LotState, to: LotState): boolean {
  return canChange(LOT_TRANSITIONS, from, to);
}

/** Refuses any other change. Throws MeasureError `illegal-transition`. */
export function assertLotTransition(from: LotState, to: LotState): void {
  assertChange(LOT_TRANSITIONS, LOT_STATE_LABELS, from, to);
}

/** States in which a lot is or may come back before buyers: its certificate cannot serve another lot. */
export const LIVE_LOT_STATES: readonly LotState[] = ['submitted', 'open', 'paused', 'reserved', 'sold'];

/** States that anyone may see. */
export const PUBLIC_LOT_STATES: readonly LotState[] = ['open', 'reserved', 'sold'];
