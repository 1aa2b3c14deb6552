import type { SettlementSheet } from '#shared/settlement/sheet-types.ts';

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
  'price-fixed': 'Price fixed for a buyer',
  'fix-ran-out': 'The price fix ran out: offered again',
  'fix-given-up': 'The price fix was given up: offered again',
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
