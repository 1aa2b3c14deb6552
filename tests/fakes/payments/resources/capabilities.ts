import type Stripe from 'stripe';
import { endpoint, findAccount, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { resourceMissing } from '../errors.ts';
import { flag } from '../input.ts';
import { wholeList } from '../paginate.ts';
import { refreshAccount, tellAccountUpdated } from './account-state.ts';

type Name = 'transfers' | 'card_payments';

function isName(name: string): name is Name {
  return name === 'transfers' || name === 'card_payments';
}

function capabilityOf(account: Stripe.Account, name: string) {
  if (!isName(name)) throw resourceMissing('capability', name, 'capability');
  const status = account.capabilities?.[name];
  const due = [...(account.requirements?.currently_due ?? [])];
  return {
    id: name,
    object: 'capability',
    account: account.id,
    requested: status !== undefined,
    requested_at: status === undefined ? null : (account.created ?? null),
    requirements: {
      alternatives: [],
      current_deadline: null,
      currently_due: due,
      disabled_reason: null,
      errors: [],
      eventually_due: due,
      past_due: due,
      pending_verification: [],
    },
    status: status ?? 'unrequested',
  } satisfies Stripe.Capability;
}

export const capabilityEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/accounts/:id/capabilities', {}, (call) => {
    const account = findAccount(call, pathId(call));
    const names = Object.keys(account.capabilities ?? {});
    return wholeList(
      names.map((name) => capabilityOf(account, name)),
      `/v1/accounts/${account.id}/capabilities`,
    );
  }),
  endpoint('GET', '/v1/accounts/:id/capabilities/:name', {}, (call) =>
    capabilityOf(findAccount(call, pathId(call)), pathId(call, 'name')),
  ),
  endpoint('POST', '/v1/accounts/:id/capabilities/:name', { requested: flag.optional() }, (call) => {
    const account = findAccount(call, pathId(call));
    const name = pathId(call, 'name');
    if (!isName(name)) throw resourceMissing('capability', name, 'capability');
    if (call.input.requested === true) account.capabilities = { ...account.capabilities, [name]: 'inactive' };
    refreshAccount(account);
    tellAccountUpdated(call.fake, account, call.request);
    return capabilityOf(account, name);
  }),
];
