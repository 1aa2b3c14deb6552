import type Stripe from 'stripe';
import { endpoint, findAccount, pathId } from '../endpoint.ts';
import type { Call, Endpoint } from '../endpoint.ts';
import { invalidRequest } from '../errors.ts';
import { allOf, keep, newId, now, platform } from '../fake.ts';
import { listInput, mergeMetadata } from '../input.ts';
import { paginate, wholeList } from '../paginate.ts';
import { createAccountInput, updateAccountInput } from './account-input.ts';
import type { CreateAccount, UpdateAccount } from './account-input.ts';
import { refreshAccount, tellAccountUpdated } from './account-state.ts';

function payoutSettings(input: UpdateAccount, present?: Stripe.Account.Settings.Payouts) {
  const asked = input.settings?.payouts;
  return {
    debit_negative_balances: asked?.debit_negative_balances ?? present?.debit_negative_balances ?? false,
    schedule: {
      delay_days: 2,
      interval: asked?.schedule?.interval ?? present?.schedule.interval ?? 'daily',
    },
    statement_descriptor: asked?.statement_descriptor ?? present?.statement_descriptor ?? null,
  };
}

const bareSettings = {
  branding: { icon: null, logo: null, primary_color: null, secondary_color: null },
  card_payments: {
    statement_descriptor_prefix: null,
    statement_descriptor_prefix_kana: null,
    statement_descriptor_prefix_kanji: null,
  },
  dashboard: { display_name: null, timezone: 'Etc/UTC' },
  payments: {
    statement_descriptor: null,
    statement_descriptor_kana: null,
    statement_descriptor_kanji: null,
    statement_descriptor_prefix_kana: null,
    statement_descriptor_prefix_kanji: null,
  },
};

function requested(input: UpdateAccount): Stripe.Account.Capabilities {
  const names = ['transfers', 'card_payments'] as const;
  return Object.fromEntries(
    names.filter((name) => input.capabilities?.[name]?.requested).map((name) => [name, 'inactive' as const]),
  );
}

function createAccount(call: Call<CreateAccount>): Stripe.Account {
  const { fake, input } = call;
  if (input.type !== undefined && input.controller !== undefined) {
    throw invalidRequest('You may only specify one of these parameters: type, controller.');
  }
  const id = newId('acct', 16);
  const account = {
    id,
    object: 'account',
    business_profile: {
      annual_revenue: null,
      estimated_worker_count: null,
      mcc: input.business_profile?.mcc ?? null,
      minority_owned_business_designation: null,
      name: input.business_profile?.name ?? null,
      product_description: input.business_profile?.product_description ?? null,
      specified_commercial_transactions_act_url: null,
      support_address: null,
      support_email: input.business_profile?.support_email ?? null,
      support_phone: null,
      support_url: null,
      url: input.business_profile?.url ?? null,
    },
    business_type: input.business_type ?? null,
    capabilities: requested(input),
    charges_enabled: false,
    controller: {
      fees: { payer: 'application' },
      is_controller: true,
      losses: { payments: 'application' },
      requirement_collection: 'stripe',
      stripe_dashboard: { type: 'express' },
      type: 'application',
    },
    country: 'US',
    created: now(fake),
    default_currency: 'usd',
    details_submitted: false,
    email: input.email ?? null,
    external_accounts: wholeList<Stripe.ExternalAccount>([], `/v1/accounts/${id}/external_accounts`),
    metadata: mergeMetadata({}, input.metadata),
    payouts_enabled: false,
    settings: { ...bareSettings, payouts: payoutSettings(input) },
    tos_acceptance: {},
    type: 'express',
  } satisfies Stripe.Account;
  const kept = keep<Stripe.Account>(fake, platform, account);
  refreshAccount(kept);
  return kept;
}

function updateAccount(call: Call<UpdateAccount>): Stripe.Account {
  const { fake, input } = call;
  const account = findAccount(call, pathId(call));
  account.email = input.email ?? account.email;
  account.business_type = input.business_type ?? account.business_type ?? null;
  account.metadata = mergeMetadata(account.metadata ?? {}, input.metadata);
  account.capabilities = { ...requested(input), ...account.capabilities };
  if (account.business_profile && input.business_profile) {
    Object.assign(account.business_profile, input.business_profile);
  }
  if (account.settings) account.settings.payouts = payoutSettings(input, account.settings.payouts);
  refreshAccount(account);
  tellAccountUpdated(fake, account, call.request);
  return account;
}

export const accountEndpoints: Endpoint[] = [
  endpoint('POST', '/v1/accounts', createAccountInput, createAccount),
  endpoint('GET', '/v1/accounts', { ...listInput }, (call) =>
    paginate(allOf(call.fake, 'account', call.owner), call.input, '/v1/accounts'),
  ),
  endpoint('GET', '/v1/accounts/:id', {}, (call) => findAccount(call, pathId(call))),
  endpoint('POST', '/v1/accounts/:id', updateAccountInput, updateAccount),
];
