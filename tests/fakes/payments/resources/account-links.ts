import { z } from 'zod';
import type Stripe from 'stripe';
import { endpoint, findAccount, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { invalidRequest } from '../errors.ts';
import { newId, now } from '../fake.ts';
import { text, url } from '../input.ts';

const linkSeconds = 300;

export const accountLinkEndpoints: Endpoint[] = [
  endpoint(
    'POST',
    '/v1/account_links',
    {
      account: text,
      type: z.enum(['account_onboarding', 'account_update']),
      refresh_url: url,
      return_url: url,
      collect: z.enum(['currently_due', 'eventually_due']).optional(),
      collection_options: z
        .strictObject({
          fields: z.enum(['currently_due', 'eventually_due']),
          future_requirements: z.enum(['include', 'omit']).optional(),
        })
        .optional(),
    },
    (call) => {
      const { fake, input } = call;
      const account = findAccount(call, input.account, 'account');
      if (input.type === 'account_update') {
        throw invalidRequest(
          'account_update links are only for accounts whose requirements the platform collects.',
          undefined,
          'type',
        );
      }
      const token = newId('lnk', 32);
      const expiresAt = now(fake) + linkSeconds;
      fake.state.accountLinks[token] = {
        account: account.id,
        expiresAt,
        used: false,
        refreshUrl: input.refresh_url,
        returnUrl: input.return_url,
      };
      fake.store.touch();
      return {
        object: 'account_link',
        created: now(fake),
        expires_at: expiresAt,
        url: `${fake.publicUrl}/connect/${token}`,
      } satisfies Stripe.AccountLink;
    },
  ),
  endpoint('POST', '/v1/accounts/:id/login_links', {}, (call) => {
    const account = findAccount(call, pathId(call));
    if (!account.details_submitted) {
      throw invalidRequest('Cannot create a login link for an account that has not completed onboarding.');
    }
    return {
      object: 'login_link',
      created: now(call.fake),
      url: `${call.fake.publicUrl}/connect/account/${account.id}`,
    } satisfies Stripe.LoginLink;
  }),
];
