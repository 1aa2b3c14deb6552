import { usdText } from '#server/emails/mail-text.ts';
import type { DealEvent } from '#server/models/deal-event.ts';
import { CONTEST_REASON_LABELS } from './contest-reasons.ts';

type Detail = Record<string, unknown>;

function word(detail: Detail, name: string): string {
  const value = detail[name];
  return typeof value === 'string' ? value : '';
}

function contestText(detail: Detail): string {
  const labels: Readonly<Record<string, string>> = CONTEST_REASON_LABELS;
  return `Contested: ${labels[word(detail, 'reason')]?.toLowerCase() ?? 'something is wrong'}`;
}

const TEXTS: Readonly<Record<string, (detail: Detail) => string>> = {
  agreed: () => 'Bought at the asked price; quote and terms fixed',
  'payment-started': () => 'Payment page opened',
  'payment-failed': () => 'Payment declined',
  funded: () => 'Paid into escrow',
  lapsed: () => 'Not paid in time: the purchase lapsed',
  'late-payment': () => 'A payment came after the lapse and is sent back',
  'second-payment': () => 'A second payment came in and is sent back',
  'second-refunded': () => 'The second payment is sent back',
  shipped: (detail) =>
    `Shipped with ${word(detail, 'carrier')}, insured for ${usdText(word(detail, 'insured'))}`,
  'parcel-moved': (detail) => `Parcel: ${word(detail, 'status').replaceAll('_', ' ')}`,
  'parcel-lost': () => 'The carrier declares the parcel lost',
  'parcel-returned': () => 'The carrier brought the parcel back to the sender',
  'delivered-unsigned': () => 'Delivered without a signature; the buyer has to confirm it',
  delivered: (detail) =>
    word(detail, 'signedBy') === '' ? 'Delivered' : `Delivered, signed by ${word(detail, 'signedBy')}`,
  'delivery-confirmed': () => 'Delivery confirmed by the buyer',
  'receipt-recorded': (detail) => `Received mass recorded: ${word(detail, 'mass')}`,
  accepted: () => 'Accepted',
  settled: () => 'Settled: the final sheet is made, the money is released',
  'transfer-sent': () => 'Transferred to the seller’s payout account',
  transferred: () => 'Transferred to the seller’s payout account',
  'payout-sent': () => 'Payout sent to the bank',
  'paid-out': () => 'Paid out to the seller',
  'payout-failed': () => 'The payout came back',
  cancelled: (detail) => word(detail, 'reason') || 'Cancelled',
  contested: contestText,
  'taken-up': (detail) =>
    `Taken up by the desk: the time to inspect is over. ${word(detail, 'reason')}`.trim(),
  'ruled-refund': (detail) => `The desk ruled: refund in full. ${word(detail, 'reason')}`.trim(),
  'ruled-release': (detail) => `The desk ruled: release to the seller. ${word(detail, 'reason')}`.trim(),
  'refund-due': () => 'Refund ordered',
  refunded: () => 'Refunded to the buyer',
  'refund-failed': () => 'The refund came back',
  frozen: (detail) => `Frozen by the desk. ${word(detail, 'reason')}`.trim(),
  unfrozen: () => 'The freeze is lifted; deadlines are moved by its length',
};

/** The sentence of an event in the deal's register. An act without one is written out as it is named. */
export function eventText(event: Pick<DealEvent, 'act' | 'detail'>): string {
  const text = TEXTS[event.act.replaceAll('_', '-')];
  if (text !== undefined) return text((event.detail ?? {}) as Detail);
  const words = event.act.replaceAll('-', ' ').replaceAll('_', ' ');
  return words.charAt(0).toUpperCase() + words.slice(1);
}
