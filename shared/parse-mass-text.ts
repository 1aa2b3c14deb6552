import { dec, plain } from './decimal.ts';
import { MeasureError } from './domain-error.ts';
import { MASS_MAX_DECIMALS } from './mass.ts';

const BLANKS = /[\s\u00a0\u2009\u202f]+/gu;
const FRACTION = /^(?:(\d+(?: \d{3})*) )?(\d{1,4})\/(\d{1,4})$/;
const SPACED = /^\d{1,3}(?: \d{3})+$/;

/**
 * Reads a mass as people type it on a screen and answers the plain decimal text for the API, digits after the sign kept
 * as typed. Takes a dot or a comma as the decimal sign (`12.5`, `12,5`), thousands set off by spaces, commas or dots
 * where the other sign settles it (`1 234.5`, `1,234.5`, `1.234,5`, `1,234,567`), and fractions (`1 1/4`).
 * A comma before exactly three digits could be either (`1,234`) and is refused; `0,125` and `1234,567` could not.
 * Throws MeasureError `number-missing`, `number-ambiguous`, `fraction-not-exact`, `not-a-decimal` at `field`.
 */
export function parseMassText(text: string, field = ''): string {
  const tidy = text.replace(BLANKS, ' ').trim();
  if (tidy === '') throw new MeasureError('number-missing', field, 'Enter a mass.');
  const fraction = FRACTION.exec(tidy);
  if (fraction) return readFraction(fraction, field);
  const joined = joinSpaces(tidy);
  if (joined === null || !/^\d[\d.,]*$/.test(joined)) throw notANumber(field);
  const dots = joined.split('.').length - 1;
  const commas = joined.split(',').length - 1;
  if (dots > 0 && commas > 0) return readBothSigns(joined, field);
  if (commas === 1) return readOneComma(joined, joined !== tidy, field);
  if (dots > 1 || commas > 1) return readGroups(joined, dots > 1 ? '.' : ',', field);
  return tidyZeros(joined, field);
}

function notANumber(field: string): MeasureError {
  return new MeasureError('not-a-decimal', field, 'Enter a number, such as 12.34.');
}

/** Takes out spaces that set off thousands; null when they stand elsewhere. */
function joinSpaces(text: string): string | null {
  if (!text.includes(' ')) return text;
  const sign = text.search(/[.,]/);
  const whole = sign === -1 ? text : text.slice(0, sign);
  const rest = sign === -1 ? '' : text.slice(sign);
  return SPACED.test(whole) && !rest.includes(' ') ? whole.replaceAll(' ', '') + rest : null;
}

function readBothSigns(text: string, field: string): string {
  const decimalSign = text.lastIndexOf('.') > text.lastIndexOf(',') ? '.' : ',';
  const at = text.lastIndexOf(decimalSign);
  const whole = readGroups(text.slice(0, at), decimalSign === '.' ? ',' : '.', field);
  return tidyZeros(`${whole}.${text.slice(at + 1)}`, field);
}

function readOneComma(text: string, isSpaced: boolean, field: string): string {
  const [whole = '', decimals = ''] = text.split(',');
  const couldGroup = decimals.length === 3 && /^[1-9]\d{0,2}$/.test(whole) && !isSpaced;
  if (couldGroup) {
    throw new MeasureError(
      'number-ambiguous',
      field,
      `Is ${text} ${whole}.${decimals} or ${whole}${decimals}? Write it with a dot, or without the comma.`,
    );
  }
  return tidyZeros(`${whole}.${decimals}`, field);
}

function readGroups(text: string, sign: ',' | '.', field: string): string {
  const [first = '', ...groups] = text.split(sign);
  if (!/^[1-9]\d{0,2}$/.test(first) || groups.some((group) => !/^\d{3}$/.test(group)))
    throw notANumber(field);
  return first + groups.join('');
}

function readFraction([, whole = '0', over = '', under = '']: RegExpExecArray, field: string): string {
  const divisor = dec(under);
  if (divisor.isZero()) throw notANumber(field);
  const value = dec(whole.replaceAll(' ', '')).plus(dec(over).div(divisor));
  if (value.decimalPlaces() > MASS_MAX_DECIMALS) {
    throw new MeasureError(
      'fraction-not-exact',
      field,
      `This fraction has no exact decimal of ${MASS_MAX_DECIMALS} digits; enter the decimal that you read.`,
    );
  }
  return plain(value);
}

/** Plain notation: no leading zeros before another digit, a digit after the sign. */
function tidyZeros(text: string, field: string): string {
  if (!/^\d+(?:\.\d+)?$/.test(text)) throw notANumber(field);
  return text.replace(/^0+(?=\d)/, '');
}
