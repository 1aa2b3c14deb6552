interface PayoutFailure {
  code: string;
  message: string;
  /** Whether the bank account itself is at fault and must be replaced. */
  breaksBank: boolean;
}

/** Published test bank numbers and what each does to a payout. */
const failures: Record<string, PayoutFailure> = {
  '000111111116': {
    code: 'no_account',
    message: 'The bank account details on file are probably incorrect. No bank account could be located.',
    breaksBank: true,
  },
  '000111111113': {
    code: 'account_closed',
    message: 'The bank account has been closed.',
    breaksBank: true,
  },
};

export const payingBank = '000123456789';

export const couldNotProcess: PayoutFailure = {
  code: 'could_not_process',
  message: 'The bank could not process this payout.',
  breaksBank: false,
};

export function isKnownBank(number: string): boolean {
  return number === payingBank || Object.hasOwn(failures, number);
}

export function payoutFailureOf(number: string): PayoutFailure | null {
  return failures[number] ?? null;
}

export type { PayoutFailure };
