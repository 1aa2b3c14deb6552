import { TZDate } from '@date-fns/tz';
import { addDays, addMinutes, isWeekend } from 'date-fns';
import {
  ARRIVE_DAYS,
  CONTESTED_DESK_DAYS,
  FUND_MINUTES,
  INSPECT_DAYS,
  SHIP_BUSINESS_DAYS,
} from '#shared/limits.ts';

/**
 * The same time of day so many business days later, in the acting party's zone. Business days are Monday to Friday there;
 * public holidays are not known. A clock change in between moves the instant by an hour, so that the local time stays; a
 * local time that the change skips is moved on by the gap.
 */
export function addBusinessDays(from: Date, days: number, timeZone: string): Date {
  let moment: Date = new TZDate(from.getTime(), timeZone);
  for (let left = days; left > 0;) {
    moment = addDays(moment, 1);
    if (!isWeekend(moment)) left -= 1;
  }
  return new Date(moment.getTime());
}

/** Until when a purchase may start to be paid. */
export function fundByFrom(agreedAt: Date): Date {
  return addMinutes(agreedAt, FUND_MINUTES);
}

/** Until when the seller ships: business days in the seller's zone. */
export function shipByFrom(fundedAt: Date, sellerTimeZone: string): Date {
  return addBusinessDays(fundedAt, SHIP_BUSINESS_DAYS, sellerTimeZone);
}

function daysOf24Hours(from: Date, days: number): Date {
  return addMinutes(from, days * 24 * 60);
}

/** From when a parcel that has not come may be contested. */
export function arriveByFrom(shippedAt: Date): Date {
  return daysOf24Hours(shippedAt, ARRIVE_DAYS);
}

/** Until when the buyer inspects what has been delivered. */
export function inspectByFrom(deliveredAt: Date): Date {
  return daysOf24Hours(deliveredAt, INSPECT_DAYS);
}

/** Until when the desk rules on a contested deal. */
export function ruleByFrom(contestedAt: Date): Date {
  return daysOf24Hours(contestedAt, CONTESTED_DESK_DAYS);
}
