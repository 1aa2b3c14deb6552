import type { z } from 'zod';
import type { MailDefinition } from './define-mail.ts';
import { dealAcceptedBuyer } from './deal-accepted-buyer.ts';
import { dealAcceptedSeller } from './deal-accepted-seller.ts';
import { dealCancelled } from './deal-cancelled.ts';
import { dealContested } from './deal-contested.ts';
import { dealFundedBuyer } from './deal-funded-buyer.ts';
import { dealFundedSeller } from './deal-funded-seller.ts';
import { dealLapsed } from './deal-lapsed.ts';
import { dealRefunded } from './deal-refunded.ts';
import { dealRuled } from './deal-ruled.ts';
import { dealTakenUp } from './deal-taken-up.ts';
import { latePaymentRefunded } from './late-payment-refunded.ts';
import { lotExamined } from './lot-examined.ts';
import { lotOpened } from './lot-opened.ts';
import { lotPausedFloor } from './lot-paused-floor.ts';
import { lotPulled } from './lot-pulled.ts';
import { lotReturned } from './lot-returned.ts';
import { parcelDeliveredBuyer } from './parcel-delivered-buyer.ts';
import { parcelDeliveredSeller } from './parcel-delivered-seller.ts';
import { parcelShipped } from './parcel-shipped.ts';
import { payoutFailed } from './payout-failed.ts';
import { payoutSentBuyer } from './payout-sent-buyer.ts';
import { payoutSentSeller } from './payout-sent-seller.ts';
import { secondPaymentRefunded } from './second-payment-refunded.ts';
import { welcome } from './welcome.ts';

/** Every mail of the product by its name; the table in the developers' notes is made from here. */
export const MAILS = {
  'deal-accepted-buyer': dealAcceptedBuyer,
  'deal-accepted-seller': dealAcceptedSeller,
  'deal-cancelled': dealCancelled,
  'deal-contested': dealContested,
  'deal-funded-buyer': dealFundedBuyer,
  'deal-funded-seller': dealFundedSeller,
  'deal-lapsed': dealLapsed,
  'deal-refunded': dealRefunded,
  'deal-ruled': dealRuled,
  'deal-taken-up': dealTakenUp,
  'late-payment-refunded': latePaymentRefunded,
  'lot-examined': lotExamined,
  'lot-opened': lotOpened,
  'lot-paused-floor': lotPausedFloor,
  'lot-pulled': lotPulled,
  'lot-returned': lotReturned,
  'parcel-delivered-buyer': parcelDeliveredBuyer,
  'parcel-delivered-seller': parcelDeliveredSeller,
  'parcel-shipped': parcelShipped,
  'payout-failed': payoutFailed,
  'payout-sent-buyer': payoutSentBuyer,
  'payout-sent-seller': payoutSentSeller,
  'second-payment-refunded': secondPaymentRefunded,
  welcome: welcome,
} as const;

export type MailName = keyof typeof MAILS;
export type MailInput<Name extends MailName> = z.input<(typeof MAILS)[Name]['input']>;

export function isMailName(name: string): name is MailName {
  return Object.hasOwn(MAILS, name);
}

/** The definition with its input type erased; what is read from the outbox is parsed before it is used. */
export function mailDefinition(name: MailName): MailDefinition<unknown> {
  return MAILS[name] as unknown as MailDefinition<unknown>;
}
