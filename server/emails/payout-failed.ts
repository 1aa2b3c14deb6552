import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, net: amountField, failureCode: z.string() });

/** The payment provider's published words for why a bank refused, as a person says them. */
const REASONS: Readonly<Record<string, string>> = {
  account_closed: 'The bank account is closed',
  account_frozen: 'The bank account is frozen',
  bank_account_restricted: 'The bank account takes no such payment',
  bank_ownership_changed: 'The bank account has another owner now',
  could_not_process: 'The bank could not process it',
  debit_not_authorized: 'The bank account does not allow it',
  declined: 'The bank declined it',
  incorrect_account_holder_name: 'The name is not the account holder’s',
  incorrect_account_type: 'The bank account is of another type',
  invalid_account_number: 'The account number is not valid',
  invalid_currency: 'The bank account is not in US dollars',
  no_account: 'The bank knows no such account',
};

export const payoutFailed = defineMail({
  audience: 'seller',
  trigger: 'the bank or the provider refused the payout',
  says: 'the sum, the reason that the bank gave, where to mend the payout account',
  input,
  write: ({ dealCode, lotTitle, net, failureCode }) => ({
    subject: `The payout for ${lotTitle} came back`,
    heading: 'Your payout could not be paid',
    paragraphs: [
      `The payout for “${lotTitle}” was refused. The money is still yours and waits in your account at the payment provider.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Sum', value: usdText(net) },
      { label: 'Reason given', value: REASONS[failureCode] ?? failureCode.replaceAll('_', ' ') },
    ],
    action: { label: 'Look at your payout account', path: '/account' },
    closing: [],
  }),
});
