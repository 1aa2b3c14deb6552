import { z } from 'zod';
import {
  countryCode,
  dealCode,
  decimalString,
  instant,
  lotCode,
  moneySchema,
  quantitySchema,
} from './common.ts';
import { sheetSchema } from './lots.ts';

const line = (min: number, max: number, message: string) => z.string().trim().min(min, message).max(max);

export const deliveryAddress = z.object({
  name: line(2, 120, 'Write the name of who receives it'),
  line1: line(3, 120, 'Write street and number'),
  line2: z.string().trim().max(120).default(''),
  city: line(2, 80, 'Write the town'),
  postcode: line(2, 20, 'Write the postcode'),
  region: line(2, 60, 'Write the region or state'),
  country: countryCode,
  phone: z
    .string()
    .trim()
    .regex(/^\+?[0-9 ()/.-]{6,40}$/, 'Write a telephone number that the carrier can reach'),
});
export type DeliveryAddress = z.infer<typeof deliveryAddress>;

export const purchaseRequest = z.object({
  /** What the buyer saw; when the price has changed the purchase is refused rather than made at another sum. */
  total: decimalString,
  delivery: deliveryAddress,
  confirmsAge: z.literal(true, { error: 'Confirm that you are 18 or older' }),
  confirmsRules: z.literal(true, { error: 'Confirm the rules of purchase' }),
});
export type PurchaseRequest = z.infer<typeof purchaseRequest>;

export const dealParams = z.object({ code: dealCode });

export const shipRequest = z.object({
  carrier: line(2, 40, 'Write the carrier'),
  trackingNumber: z
    .string()
    .trim()
    .regex(/^[A-Za-z0-9 -]{6,60}$/, 'Write the tracking number: 6 to 60 letters and digits'),
  insuredValue: decimalString,
});
export type ShipRequest = z.infer<typeof shipRequest>;

export const receiptRequest = z.object({
  mass: quantitySchema,
  photoFileId: z.uuid().nullable().default(null),
});

/** What the upload of a photo of the weighing answers; the id goes into the receipt. */
export const receiptPhotoAnswer = z.object({ fileId: z.uuid() });
export type ReceiptPhotoAnswer = z.infer<typeof receiptPhotoAnswer>;

export const CONTEST_REASONS = ['not_arrived', 'wrong_mass', 'wrong_metal', 'damaged'] as const;
/** Why the desk has a deal: what a buyer can say, and that nobody has said anything in time. */
export const CONTEST_KINDS = [...CONTEST_REASONS, 'not_answered'] as const;
export type ContestKind = (typeof CONTEST_KINDS)[number];
export const contestRequest = z.object({
  reason: z.enum(CONTEST_REASONS, { error: 'Choose what is wrong' }),
  note: line(10, 1000, 'Say what is wrong in a sentence'),
});
export type ContestRequest = z.infer<typeof contestRequest>;

export const rulingRequest = z.object({
  ruling: z.enum(['refund', 'release'], { error: 'Choose a ruling' }),
  reason: line(10, 1000, 'Give both sides the reason in a sentence'),
});
export type RulingRequest = z.infer<typeof rulingRequest>;

/** Why the desk takes up a deal that the buyer has left unanswered. */
export const takeUpRequest = z.object({
  reason: line(10, 1000, 'Give both sides the reason in a sentence'),
});
export type TakeUpRequest = z.infer<typeof takeUpRequest>;

export const startPaymentAnswer = z.object({ url: z.url(), expiresAt: instant });

export const DEAL_STATE_VALUES = [
  'agreed',
  'funded',
  'shipped',
  'delivered',
  'accepted',
  'settled',
  'paid_out',
  'lapsed',
  'cancelled',
  'contested',
  'returning',
  'returned',
  'exchange',
  'umpire',
  'reversed',
] as const;

/** How deal and payment stand after the provider was asked. */
export const refreshPaymentAnswer = z.object({
  state: z.enum(DEAL_STATE_VALUES),
  payment: z.enum(['none', 'starting', 'open', 'paid', 'expired']),
});

export const dealEventAnswer = z.object({
  at: instant,
  act: z.string(),
  text: z.string(),
  who: z.enum(['buyer', 'seller', 'desk', 'provider', 'carrier', 'clock', 'house']),
  held: moneySchema,
});
export type DealEventAnswer = z.infer<typeof dealEventAnswer>;

const dealParty = z.object({ displayName: z.string(), region: z.string() });

export const dealAnswer = z.object({
  code: dealCode,
  state: z.enum(DEAL_STATE_VALUES),
  /** How the reader stands to the deal. */
  side: z.enum(['buyer', 'seller', 'desk']),
  lot: z.object({
    code: lotCode,
    title: z.string(),
    form: z.string(),
    thumb: z.string().nullable(),
    region: z.string(),
    gross: quantitySchema,
    /** One step of the seller's balance, where it was given. */
    readability: quantitySchema.nullable(),
  }),
  counterparty: dealParty,
  buyer: dealParty,
  seller: dealParty,
  price: moneySchema,
  shipping: moneySchema,
  total: moneySchema,
  held: moneySchema,
  /** Only for the seller and the desk. */
  commission: z
    .object({ percent: decimalString, minimum: moneySchema, amount: moneySchema, net: moneySchema })
    .nullable(),
  paymentMethod: z.enum(['card', 'bank_debit']),
  quotes: z.array(
    z.object({
      metal: z.string(),
      usdPerTroyOunce: decimalString,
      at: instant.nullable(),
      source: z.string(),
    }),
  ),
  provisionalSheet: sheetSchema,
  finalSheet: sheetSchema.nullable(),
  /** The seller sees it from funding on; the buyer always. */
  delivery: deliveryAddress.nullable(),
  parcel: z
    .object({
      carrier: z.string(),
      trackingNumber: z.string(),
      insured: moneySchema,
      status: z.string(),
      deliveredAt: instant.nullable(),
      isSigned: z.boolean().nullable(),
      signedBy: z.string().nullable(),
    })
    .nullable(),
  receipt: z
    .object({
      mass: quantitySchema,
      differenceGrams: decimalString,
      isWithinScales: z.boolean(),
      at: instant,
      /** The buyer's photo of the weighing, where there is one; its sizes as of a lot's photo. */
      photoUrl: z.string().nullable(),
      photoThumb: z.string().nullable(),
    })
    .nullable(),
  contest: z.object({ reason: z.enum(CONTEST_KINDS), note: z.string(), at: instant }).nullable(),
  payout: z
    .object({
      state: z.enum(['due', 'transferred', 'sent', 'paid', 'failed']),
      amount: moneySchema,
      failureCode: z.string().nullable(),
      paidAt: instant.nullable(),
    })
    .nullable(),
  refund: z.object({ state: z.enum(['due', 'sent', 'succeeded', 'failed']), amount: moneySchema }).nullable(),
  certificateUrl: z.string().nullable(),
  endReason: z.string().nullable(),
  agreedAt: instant,
  events: z.array(dealEventAnswer),
  /** What is due next, for whom, and what silence will mean. */
  due: z
    .object({
      who: z.enum(['buyer', 'seller', 'desk', 'carrier', 'provider']),
      act: z.string(),
      at: instant.nullable(),
      silence: z.string(),
    })
    .nullable(),
  now: instant,
  can: z.object({
    pay: z.boolean(),
    ship: z.boolean(),
    confirmDelivery: z.boolean(),
    recordReceipt: z.boolean(),
    accept: z.boolean(),
    contest: z.boolean(),
    rule: z.boolean(),
    /** The desk: the buyer's days to inspect are over and nothing was said. */
    takeUp: z.boolean(),
    freeze: z.boolean(),
    unfreeze: z.boolean(),
  }),
  isFrozen: z.boolean(),
});
export type DealAnswer = z.infer<typeof dealAnswer>;

export const dealRow = z.object({
  code: dealCode,
  state: z.enum(DEAL_STATE_VALUES),
  side: z.enum(['buyer', 'seller']),
  lotTitle: z.string(),
  form: z.string(),
  thumb: z.string().nullable(),
  total: moneySchema,
  due: dealAnswer.shape.due,
  isMyTurn: z.boolean(),
  /** Since when it is over: the end, or the day it was paid out. Null while it runs. */
  closedAt: instant.nullable(),
  updatedAt: instant,
});
export type DealRow = z.infer<typeof dealRow>;

/** "Where I stand": to do, running, closed. */
export const dealsAnswer = z.object({
  toDo: z.array(dealRow),
  running: z.array(dealRow),
  closed: z.array(dealRow),
  now: instant,
});
export type DealsAnswer = z.infer<typeof dealsAnswer>;
