import { z } from 'zod';
import { isKnownBank } from '../banks.ts';
import { endpoint, findAccount, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { invalidRequest, resourceMissing } from '../errors.ts';
import { currency, listInput, text } from '../input.ts';
import { paginate } from '../paginate.ts';
import { attachBank, refreshAccount, tellAccountUpdated } from './account-state.ts';

const bank = z.strictObject({
  object: z.literal('bank_account'),
  country: z.literal('US'),
  currency,
  account_number: text,
  routing_number: text.optional(),
  account_holder_name: text.optional(),
  account_holder_type: text.optional(),
});

export const externalAccountEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/accounts/:id/external_accounts', { ...listInput, object: text.optional() }, (call) => {
    const account = findAccount(call, pathId(call));
    const banks = account.external_accounts?.data ?? [];
    return paginate(banks, call.input, `/v1/accounts/${account.id}/external_accounts`);
  }),
  endpoint('GET', '/v1/accounts/:id/external_accounts/:bank', {}, (call) => {
    const account = findAccount(call, pathId(call));
    const id = pathId(call, 'bank');
    const found = account.external_accounts?.data.find((candidate) => candidate.id === id);
    if (!found) throw resourceMissing('external account', id);
    return found;
  }),
  endpoint('POST', '/v1/accounts/:id/external_accounts', { external_account: bank }, (call) => {
    const account = findAccount(call, pathId(call));
    const { account_number: number, account_holder_name: holder } = call.input.external_account;
    if (!isKnownBank(number)) {
      throw invalidRequest(
        'You must use a test bank account number in test mode.',
        'account_number_invalid',
        'external_account[account_number]',
      );
    }
    const attached = attachBank(call.fake, account, number, holder ?? null);
    refreshAccount(account);
    tellAccountUpdated(call.fake, account, call.request);
    return attached;
  }),
];
