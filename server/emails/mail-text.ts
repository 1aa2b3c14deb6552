import { TZDate } from '@date-fns/tz';
import { format } from 'date-fns';
import { z } from 'zod';
import { dealCode, decimalString, instant, lotCode } from '#shared/schemas/common.ts';

/** US dollars as a person reads them: '4168.38' gives 'US$ 4,168.38'. */
export function usdText(amount: string): string {
  const [whole = '0', cents = '00'] = amount.split('.');
  return `US$ ${whole.replace(/\B(?=(\d{3})+(?!\d))/g, ',')}.${cents.padEnd(2, '0')}`;
}

/** A moment in the reader's zone, with the zone's name: 'Tue 8 December 2026, 17:00 (America/Denver)'. */
export function momentText(at: string, timeZone: string): string {
  return `${format(new TZDate(new Date(at).getTime(), timeZone), 'EEE d MMMM yyyy, HH:mm')} (${timeZone})`;
}

export const dealMail = { dealCode, lotTitle: z.string().max(120) };
export const lotMail = { lotCode, lotTitle: z.string().max(120) };
export const amountField = decimalString;
export const instantField = instant;
export const reasonField = z.string().max(1000);

export const dealPath = (code: string) => `/deals/${code}`;
export const lotPath = (code: string) => `/lots/${code}`;
export const draftPath = (code: string) => `/sell/${code}`;
