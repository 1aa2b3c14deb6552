import { hasCheckDigit } from '../cards.ts';
import type { Card } from '../resources/charge-builder.ts';
import type { FieldError } from './layout.ts';

export interface PayForm {
  number: string;
  expiry: string;
  cvc: string;
  name: string;
}

export const emptyPayForm: PayForm = { number: '', expiry: '', cvc: '', name: '' };

export function readPayForm(body: unknown): PayForm {
  const fields = typeof body === 'object' && body !== null ? (body as Record<string, unknown>) : {};
  const read = (key: string): string => {
    const value = fields[key];
    return typeof value === 'string' ? value.trim().slice(0, 100) : '';
  };
  return { number: read('number'), expiry: read('expiry'), cvc: read('cvc'), name: read('name') };
}

/** Reads a month and year like 12/34; null when it is not one. */
function readExpiry(text: string): { month: number; year: number } | null {
  const match = /^(0?[1-9]|1[0-2])\s*[/-]\s*(?:20)?(\d{2})$/.exec(text);
  if (!match?.[1] || !match[2]) return null;
  return { month: Number.parseInt(match[1], 10), year: 2000 + Number.parseInt(match[2], 10) };
}

/** The card, or everything that is wrong with the form at once. `at` is the present time in Unix seconds. */
export function checkPayForm(form: PayForm, at: number): { card: Card } | { errors: FieldError[] } {
  const errors: FieldError[] = [];
  const number = form.number.replace(/[\s-]/g, '');
  if (number === '') errors.push({ field: 'number', message: 'Enter a card number' });
  else if (!hasCheckDigit(number)) {
    errors.push({ field: 'number', message: 'Check the card number: its digits do not fit together' });
  }
  const expiry = readExpiry(form.expiry);
  const today = new Date(at * 1000);
  const month = today.getUTCFullYear() * 12 + today.getUTCMonth() + 1;
  if (!expiry) errors.push({ field: 'expiry', message: 'Enter month and year of expiry, like 12/34' });
  else if (expiry.year * 12 + expiry.month < month) {
    errors.push({ field: 'expiry', message: 'Enter an expiry date that has not passed' });
  }
  if (!/^\d{3,4}$/.test(form.cvc)) {
    errors.push({ field: 'cvc', message: 'Enter the 3 or 4 digits of the security code' });
  }
  if (errors.length > 0 || !expiry) return { errors };
  return {
    card: { number, expiryMonth: expiry.month, expiryYear: expiry.year, name: form.name || null },
  };
}
