/** Every limit that a person can run into, in one place; the documents quote this file. */
export const RATE_LIMITS = {
  /** Failed tries at one account from one address. */
  'sign-in': { windowSeconds: 900, requestsMax: 10 },
  /** Failed tries from one address at any accounts: one password tried on many of them. */
  'sign-in-address': { windowSeconds: 900, requestsMax: 60 },
  'sign-up': { windowSeconds: 3600, requestsMax: 20 },
  /** Asking who is here: each caller without a cookie is given a session, so this is held lower than reading. */
  session: { windowSeconds: 60, requestsMax: 120 },
  valuation: { windowSeconds: 60, requestsMax: 60 },
  upload: { windowSeconds: 600, requestsMax: 120 },
  write: { windowSeconds: 60, requestsMax: 120 },
  read: { windowSeconds: 60, requestsMax: 600 },
  webhook: { windowSeconds: 60, requestsMax: 3000 },
} as const;
export type RateLimitName = keyof typeof RATE_LIMITS;

export const PASSWORD_LENGTH_MIN = 10;
export const PASSWORD_LENGTH_MAX = 128;

export const PHOTOS_MAX = 12;
export const PHOTO_BYTES_MAX = 15 * 1024 * 1024;
export const PHOTO_PIXELS_MAX = 60_000_000;
export const DOCUMENT_BYTES_MAX = 10 * 1024 * 1024;

export const TITLE_LENGTH_MAX = 120;
export const DESCRIPTION_LENGTH_MAX = 4000;

/** Lowest price of a lot, in minor units of US dollars. */
export const PRICE_MINOR_MIN = 2_000n;
/** The most that one card payment carries, in minor units: US$ 999,999.99, as the payment provider publishes it. */
export const PAYMENT_MINOR_MAX = 99_999_999n;
/** Highest price of a lot and highest charge for its parcel, in minor units: together still one card payment. */
export const PRICE_MINOR_MAX = 99_000_000n;
export const SHIPPING_MINOR_MAX = 999_999n;
/** Bounds of a linked price and of an outright price's floor, in % of melt value. */
export const LINKED_PERCENT_MIN = '1';
export const LINKED_PERCENT_MAX = '150';
export const FLOOR_PERCENT_MIN = '1';
export const FLOOR_PERCENT_MAX = '150';
/** How long a price fix holds a lot, and how long the same member waits for another one of the same lot. */
export const PRICE_FIX_MINUTES = 10;
export const PRICE_FIX_AGAIN_HOURS = 24;

export const LOT_OPEN_DAYS_MAX = 90;
export const REGISTER_PAGE_SIZE = 25;
/** Counts stop here: "more than 1,000". */
export const REGISTER_COUNT_MAX = 1_000;

/** Quotes: the defaults of the house. */
export const QUOTE_POLL_SECONDS = 60;
export const QUOTE_STALE_SECONDS = 300;
export const QUOTE_JUMP_PERCENT = { Au: '2', Ag: '4', Pt: '4', Pd: '4' } as const;
export const QUOTE_CONFIRM_POLLS = 2;
export const QUOTE_CONFIRM_PERCENT = '0.5';
export const QUOTE_ALARM_POLLS = 10;

/** Deadlines of a deal, from entering the state. */
export const FUND_MINUTES = 35;
export const SHIP_BUSINESS_DAYS = 5;
export const ARRIVE_DAYS = 10;
export const INSPECT_DAYS = 5;
export const CONTESTED_DESK_DAYS = 7;

export const SESSION_IDLE_HOURS = 12;
/** A visitor who has not signed in has nothing to lose but the page's token. */
export const ANONYMOUS_SESSION_IDLE_HOURS = 2;
export const SESSION_ABSOLUTE_DAYS = 7;
