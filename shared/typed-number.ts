import { MeasureError } from './domain-error.ts';
import { parseMassText } from './parse-mass-text.ts';

/**
 * Reads a number as typed on a screen, with dot or comma, into plain decimal text. A minus is kept, so that the engine
 * can say what is wrong with a value below zero; `1,234` is refused as ambiguous and blank as missing.
 * Throws MeasureError `number-missing`, `number-ambiguous`, `not-a-decimal` and those of `parseMassText` at `field`.
 */
export function typedNumber(text: string, field: string, missing: string): string {
  const tidy = text.trim();
  if (tidy === '') throw new MeasureError('number-missing', field, missing);
  const minus = /^[-−]\s*(.+)$/u.exec(tidy);
  if (minus) return `-${parseMassText(minus[1] ?? '', field)}`;
  return parseMassText(tidy, field);
}

/** The same for sums and fractions of mass, where `1/2` is a slip and not a way to write a number. */
export function typedDecimal(text: string, field: string, missing: string): string {
  if (text.includes('/')) {
    throw new MeasureError('not-a-decimal', field, 'Enter a number, such as 12.34.');
  }
  return typedNumber(text, field, missing);
}
