import type Stripe from 'stripe';
import { emit } from '../events.ts';
import type { RequestNote } from '../events.ts';
import { keep, newId } from '../fake.ts';
import type { Fake } from '../fake.ts';

const atSignUp = ['external_account', 'individual.first_name', 'individual.last_name', 'tos_acceptance.date'];

function requirements(due: string[], disabledReason: string | null): Stripe.Account.Requirements {
  return {
    alternatives: [],
    current_deadline: null,
    currently_due: due,
    disabled_reason: disabledReason as Stripe.Account.Requirements.DisabledReason | null,
    errors: [],
    eventually_due: [...due],
    past_due: [...due],
    pending_verification: [],
  };
}

function usableBank(account: Stripe.Account): boolean {
  const banks = account.external_accounts?.data ?? [];
  return banks.some((bank) => bank.object === 'bank_account' && bank.status !== 'errored');
}

/** Derives capabilities, flags and requirements from what the account has submitted. */
export function refreshAccount(account: Stripe.Account): void {
  const hasBank = usableBank(account);
  const due = account.details_submitted ? (hasBank ? [] : ['external_account']) : atSignUp;
  account.requirements = requirements(due, due.length > 0 ? 'requirements.past_due' : null);
  const capabilities = { ...account.capabilities };
  for (const name of Object.keys(capabilities) as Array<keyof Stripe.Account.Capabilities>) {
    capabilities[name] = account.details_submitted ? 'active' : 'inactive';
  }
  account.capabilities = capabilities;
  account.charges_enabled = capabilities.card_payments === 'active';
  account.payouts_enabled = account.details_submitted && hasBank;
}

export function tellAccountUpdated(fake: Fake, account: Stripe.Account, request?: RequestNote): void {
  emit(fake, account.id, 'account.updated', account, { ...(request && { request }) });
  fake.store.touch();
}

/** Makes a bank account the one that payouts go to. The full number stays with the fake. */
export function attachBank(fake: Fake, account: Stripe.Account, number: string, holder: string | null) {
  const bank: Stripe.BankAccount = {
    id: newId('ba'),
    object: 'bank_account',
    account: account.id,
    account_holder_name: holder,
    account_holder_type: 'individual',
    account_type: null,
    available_payout_methods: ['standard'],
    bank_name: 'TEST BANK',
    country: 'US',
    currency: 'usd',
    default_for_currency: true,
    fingerprint: `bank${number}`,
    last4: number.slice(-4),
    metadata: {},
    routing_number: '110000000',
    status: 'new',
  };
  keep(fake, account.id, bank);
  fake.state.bankNumbers[bank.id] = number;
  if (account.external_accounts) account.external_accounts.data = [bank];
  emit(fake, account.id, 'account.external_account.created', bank);
  return bank;
}

/** Marks the bank account errored after a payout that it could not take. */
export function breakBank(fake: Fake, account: Stripe.Account, bankId: string): void {
  const bank = account.external_accounts?.data.find((candidate) => candidate.id === bankId);
  if (bank?.object !== 'bank_account') return;
  bank.status = 'errored';
  // The list inside the account and the registry may be two copies after a restart.
  keep(fake, account.id, bank);
  refreshAccount(account);
  emit(fake, account.id, 'account.external_account.updated', bank);
  tellAccountUpdated(fake, account);
}

/** The hosted form has been submitted: everything asked for is there. */
export function completeOnboarding(
  fake: Fake,
  account: Stripe.Account,
  form: { name: string; bankNumber: string },
): void {
  account.details_submitted = true;
  account.business_type ??= 'individual';
  account.business_profile = {
    ...account.business_profile,
    name: form.name,
  } as Stripe.Account.BusinessProfile;
  attachBank(fake, account, form.bankNumber, form.name);
  refreshAccount(account);
  tellAccountUpdated(fake, account);
}
