const SHOWN = 8;

/** The end of a quote's id, enough to find it by; the whole id stands in the stored sheet. */
export function shortQuoteNumber(id: string): string {
  return id.slice(-SHOWN);
}
