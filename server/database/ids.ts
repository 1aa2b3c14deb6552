import { randomBytes, randomInt } from 'node:crypto';

/** A UUID of version 7: random enough to be public, near enough to time order to keep index pages warm. Never read an order from it. */
export function newId(): string {
  const bytes = randomBytes(16);
  const millis = BigInt(Date.now());
  for (let index = 0; index < 6; index += 1) {
    bytes[index] = Number((millis >> BigInt(8 * (5 - index))) & 0xffn);
  }
  bytes[6] = (bytes[6]! & 0x0f) | 0x70;
  bytes[8] = (bytes[8]! & 0x3f) | 0x80;
  const hex = bytes.toString('hex');
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-${hex.slice(12, 16)}-${hex.slice(16, 20)}-${hex.slice(20)}`;
}

/** Letters and digits that survive being read over a telephone: no I, L, O, U, 0 or 1. */
const CODE_ALPHABET = '23456789ABCDEFGHJKMNPQRSTVWXYZ';

/** A short public code such as `S-2K7F4Q`; the caller relies on a UNIQUE key, not on luck. */
export function newCode(prefix: 'S' | 'D'): string {
  let code = '';
  for (let index = 0; index < 6; index += 1) code += CODE_ALPHABET[randomInt(CODE_ALPHABET.length)];
  return `${prefix}-${code}`;
}
