import { LOT_STATE_LABELS, type LotState } from '#shared/lot-states.ts';

type StateWords = {
  name: string;
  /** What it means for the seller, and what to do next. */
  next: string;
  group: 'todo' | 'running' | 'ended';
};

/** What each state of a lot means to its seller. */
export const stateWords: Record<LotState, StateWords> = {
  draft: {
    name: LOT_STATE_LABELS.draft,
    next: 'Only you see it. Go on describing it, then hand it to the desk.',
    group: 'todo',
  },
  returned: {
    name: LOT_STATE_LABELS.returned,
    next: 'Read the reason, work on it again, and hand it in anew.',
    group: 'todo',
  },
  submitted: {
    name: LOT_STATE_LABELS.submitted,
    next: 'The assay desk compares the certificate with what you entered. Nothing for you to do; a mail tells the outcome.',
    group: 'running',
  },
  open: {
    name: LOT_STATE_LABELS.open,
    next: 'On the register. You can change the price, pause it or withdraw it.',
    group: 'running',
  },
  paused: {
    name: LOT_STATE_LABELS.paused,
    next: 'Off the register until you reopen it.',
    group: 'todo',
  },
  reserved: {
    name: LOT_STATE_LABELS.reserved,
    next: 'A buyer has agreed and is paying into escrow. Do not ship before it is funded.',
    group: 'running',
  },
  sold: { name: LOT_STATE_LABELS.sold, next: 'The deal says what comes next.', group: 'running' },
  closed: {
    name: LOT_STATE_LABELS.closed,
    next: 'Off the register for good. A copy can be drafted.',
    group: 'ended',
  },
  withdrawn: {
    name: LOT_STATE_LABELS.withdrawn,
    next: 'Off the register for good. A copy can be drafted.',
    group: 'ended',
  },
};

const actWords: Record<string, string> = {
  submitted: 'Handed to the desk',
  returned: 'Returned by the desk',
  redrafted: 'Taken back into drafting',
  verified: 'Certificate verified',
  examined: 'Examined by the desk',
  opened: 'Opened on the register',
  'price-changed': 'Price changed',
  paused: 'Paused',
  reopened: 'Reopened',
  reserved: 'Reserved for a buyer',
  lapsed: 'The buyer did not pay in time',
  sold: 'Sold: paid into escrow',
  closed: 'Closed',
  'deal-cancelled': 'The deal was cancelled',
  withdrawn: 'Withdrawn',
  pulled: 'Pulled by the desk',
};

/** An entry of a lot's history in words. */
export function actWord(act: string): string {
  const plain = act.replaceAll('-', ' ');
  return actWords[act] ?? plain.charAt(0).toUpperCase() + plain.slice(1);
}
