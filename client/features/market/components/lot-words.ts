import type { LotAnswer } from '#shared/schemas/lots.ts';
import type { SettlementSheet } from '#shared/settlement/sheet-types.ts';

type Standing = Pick<LotAnswer, 'state' | 'isMine'>;

const forBuyers: Record<LotAnswer['state'], string> = {
  draft: 'It is still being described and nobody else can see it.',
  submitted: 'The assay desk is looking at it; it is not offered yet.',
  returned: 'The assay desk has returned it to the seller; it is not offered.',
  open: 'It is offered, but this account cannot buy.',
  reserved:
    'Reserved: a buyer has agreed to it and has a short time to pay. If that time runs out it is offered again.',
  sold: 'Sold: it is paid for and cannot be bought any more.',
  paused: 'The seller has paused it; it cannot be bought for now.',
  closed: 'Closed: it is not offered any more.',
  withdrawn: 'Withdrawn: it is not offered any more.',
};

const forSeller: Partial<Record<LotAnswer['state'], string>> = {
  open: 'It is offered; others see this page as you do, without your own sheet.',
  reserved: 'Reserved: a buyer has agreed to it and has a short time to pay.',
  sold: 'Sold: the buyer’s payment is held in escrow, or has been released.',
  paused: 'You have paused it; buyers do not see it.',
};

/** How the lot stands, in a sentence for who is reading. */
export function stateWords({ state, isMine }: Standing): string {
  return (isMine ? forSeller[state] : undefined) ?? forBuyers[state];
}

/** One word that somebody would say of it; nothing while it is simply open. */
export function stateWord(state: LotAnswer['state']): string | null {
  return state === 'open' ? null : state === 'submitted' ? 'with the desk' : state;
}

/** The oldest quote that the sheet rests on, so that nothing is promised as newer than it is. */
export function sheetQuotedAt(sheet: SettlementSheet): string | null {
  const times = sheet.quotes.flatMap(({ at }) => (at === null ? [] : [at]));
  return times.sort()[0] ?? null;
}

const acts: Record<string, string> = {
  submitted: 'Submitted to the desk',
  returned: 'Returned by the desk',
  examined: 'Examined by the desk',
  opened: 'Opened to buyers',
  'price-changed': 'Price changed',
  paused: 'Paused',
  reopened: 'Offered again',
  reserved: 'Agreed to by a buyer, who is to pay',
  lapsed: 'Not paid in time: offered again',
  sold: 'Paid for',
  closed: 'Closed',
  withdrawn: 'Withdrawn',
  pulled: 'Pulled by the desk',
  redrafted: 'Taken up again by the seller',
};

/** The act of an entry in the lot's history, in words. */
export function actWords(act: string): string {
  const known = acts[act];
  if (known) return known;
  const words = act.replaceAll(/[-_]/g, ' ');
  return words.charAt(0).toUpperCase() + words.slice(1);
}
