/** Published test card numbers and what each does. */
interface CardOutcome {
  code: string;
  declineCode: string | null;
  message: string;
}

const declines: Record<string, CardOutcome> = {
  '4000000000000002': {
    code: 'card_declined',
    declineCode: 'generic_decline',
    message: 'Your card was declined.',
  },
  '4000000000009995': {
    code: 'card_declined',
    declineCode: 'insufficient_funds',
    message: 'Your card has insufficient funds.',
  },
  '4000000000000069': {
    code: 'expired_card',
    declineCode: 'expired_card',
    message: 'Your card has expired.',
  },
  '4000000000000127': {
    code: 'incorrect_cvc',
    declineCode: 'incorrect_cvc',
    message: "Your card's security code is incorrect.",
  },
};

/** Pays, and is disputed by its holder right after. */
export const disputingCard = '4000000000000259';
const accepted = new Set(['4242424242424242', '4000000000000077', '5555555555554444', disputingCard]);

/** Null when the card pays. A number that is not published here is declined, so nothing pays by chance. */
export function declineOf(number: string): CardOutcome | null {
  if (accepted.has(number)) return null;
  return (
    declines[number] ?? {
      code: 'card_declined',
      declineCode: 'test_mode_live_card',
      message: 'Your card was declined: only published test card numbers work here.',
    }
  );
}

export function cardBrand(number: string): string {
  return number.startsWith('5') ? 'mastercard' : 'visa';
}

/** The check digit rule of ISO/IEC 7812-1. */
export function hasCheckDigit(number: string): boolean {
  if (!/^\d{12,19}$/.test(number)) return false;
  let sum = 0;
  [...number].reverse().forEach((digit, index) => {
    const value = digit.charCodeAt(0) - 48;
    const doubled = index % 2 === 1 ? value * 2 : value;
    sum += doubled > 9 ? doubled - 9 : doubled;
  });
  return sum % 10 === 0;
}
