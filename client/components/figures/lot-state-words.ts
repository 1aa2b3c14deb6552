import type { LotAnswer } from '#shared/schemas/lots.ts';

type Standing = Pick<LotAnswer, 'state' | 'isMine' | 'dealCode'>;

const forBuyers: Record<LotAnswer['state'], string> = {
  draft: 'It is still being described and nobody else can see it.',
  submitted: 'The assay desk is looking at it; it is not offered yet.',
  returned: 'The assay desk has returned it to the seller; it is not offered.',
  open: 'It is offered, but this account cannot buy.',
  reserved:
    'Reserved: a buyer has agreed to it and has a short time to pay, or holds its price. If that time runs out it is offered again.',
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
export function stateWords({ state, isMine, dealCode }: Standing): string {
  if (!isMine && dealCode !== null)
    return 'You have agreed to this lot; what is due next stands in the deal.';
  return (isMine ? forSeller[state] : undefined) ?? forBuyers[state];
}

/** One word that somebody would say of it; nothing while it is simply open. */
export function stateWord(state: LotAnswer['state']): string | null {
  return state === 'open' ? null : state === 'submitted' ? 'with the desk' : state;
}
