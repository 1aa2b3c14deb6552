import { DEAL_STATE_LABELS } from '#shared/deal-states.ts';
import type { CONTEST_REASONS, ContestKind, DealAnswer, DealEventAnswer } from '#shared/schemas/deals.ts';

export type ContestReason = (typeof CONTEST_REASONS)[number];
export type Side = DealAnswer['side'];
type Who = DealEventAnswer['who'];

/** A sum of nothing, as it travels. */
export function isNothing(amount: string): boolean {
  return /^-?0+(\.0+)?$/.test(amount);
}

/** Who acted, as the reader would say it. */
export function whoWord(who: Who, side: Side): string {
  return who === side ? 'you' : who;
}

export const contestReasons: Readonly<Record<ContestReason, { label: string; hint: string }>> = {
  not_arrived: {
    label: 'It has not arrived',
    hint: 'Before a delivery: the carrier’s time is over, or the parcel is lost.',
  },
  wrong_mass: {
    label: 'The mass is wrong',
    hint: 'What you weighed lies outside what both scales can tell apart.',
  },
  wrong_metal: {
    label: 'The metal is wrong',
    hint: 'Not the metal, or not the fineness, that the certificate names.',
  },
  damaged: { label: 'It is damaged', hint: 'The seal was broken, or something is missing from the parcel.' },
};

/** What stands against a deal, as a heading. */
export function contestWord(kind: ContestKind): string {
  if (kind === 'not_answered') return 'Taken up by the desk: the buyer has not answered in time';
  return `Contested: ${contestReasons[kind].label.toLowerCase()}`;
}

/** Whether two weighings may be of one piece. */
export function scalesWord(isWithinScales: boolean): string {
  return isWithinScales
    ? 'The two weighings agree: no further apart than one step of each balance together.'
    : 'The two weighings differ by more than one step of each balance together.';
}

const stateWords: Partial<Record<DealAnswer['state'], string>> = {
  agreed: 'Agreed, not paid',
  funded: 'Paid into escrow',
  shipped: 'On its way',
  delivered: 'Delivered, being inspected',
  settled: 'Settled, payout on its way',
};

export function stateWord(state: DealAnswer['state']): string {
  return stateWords[state] ?? DEAL_STATE_LABELS[state];
}

const parcelWords: Readonly<Record<string, string>> = {
  registered: 'announced; not with the carrier yet',
  accepted: 'with the carrier',
  in_transit: 'on its way',
  delivered: 'delivered',
  lost: 'lost, says the carrier',
  returned: 'brought back to the sender',
};

export function parcelWord(status: string): string {
  return parcelWords[status] ?? status.replaceAll('_', ' ');
}

type Payout = NonNullable<DealAnswer['payout']>;
const payoutWords: Record<Payout['state'], string> = {
  due: 'Ordered; not transferred yet',
  transferred: 'In the seller’s account at the payment provider; the payout to the bank follows',
  sent: 'On its way to the seller’s bank',
  paid: 'Paid out to the seller’s bank',
  failed: 'The payout came back; it is tried again once the bank details are right',
};

export function payoutWord(state: Payout['state']): string {
  return payoutWords[state];
}

type Refund = NonNullable<DealAnswer['refund']>;
const refundWords: Record<Refund['state'], string> = {
  due: 'Ordered; not sent yet',
  sent: 'On its way back to the buyer',
  succeeded: 'Back with the buyer',
  failed: 'Came back; it is tried again',
};

export function refundWord(state: Refund['state']): string {
  return refundWords[state];
}

/** A side, named as in a sentence: 'Ines Marlow, Harrow Vale'. */
export function partyText({ displayName, region }: DealAnswer['counterparty']): string {
  return `${displayName}, ${region}`;
}

/** The other side, named as in a sentence. */
export function counterpartyText(deal: Pick<DealAnswer, 'counterparty'>): string {
  return partyText(deal.counterparty);
}
