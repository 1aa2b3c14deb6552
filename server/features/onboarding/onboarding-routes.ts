import { randomUUID } from 'node:crypto';
import { memberAnswer, onboardingAnswer, type MemberAnswer } from '#shared/schemas/session.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { env } from '#server/env.ts';
import { asRefusal } from '#server/features/payments/as-refusal.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';
import { defineRoute, type Actor, type RouteDefinition } from '#server/routing/define-route.ts';
import { locksOfAccount } from './account-locks.ts';
import { applyAccount } from './apply-account.ts';
import { linkPayoutAccount, openPayoutAccount } from './open-payout-account.ts';

/** The account at the provider is made once for each member: the key stands for the member, not for the request. */
async function accountIdOf(actor: Actor): Promise<string> {
  const locks = { members: [actor.id] };
  const opened = await withTransaction(locks, (unit) => openPayoutAccount({ memberId: actor.id }, unit));
  if (opened.providerAccountId !== null) return opened.providerAccountId;
  const made = await asRefusal(() =>
    paymentClient().createAccount({
      email: actor.email,
      memberId: actor.id,
      idempotencyKey: `account:${actor.id}:v1`,
    }),
  );
  const linked = await withTransaction(locks, (unit) =>
    linkPayoutAccount({ memberId: actor.id, accountId: made.accountId }, unit),
  );
  return linked.providerAccountId ?? made.accountId;
}

function present(account: PayoutAccount | null): MemberAnswer['payouts'] {
  if (account === null || account.providerAccountId === null) return { state: 'none', requirements: [] };
  const isReady = account.transfersActive && account.payoutsEnabled;
  return {
    state: isReady ? 'ready' : 'started',
    requirements: Array.isArray(account.requirements) ? account.requirements.map(String) : [],
  };
}

const startRoute = defineRoute({
  method: 'post',
  path: '/api/v1/me/payout-account',
  summary: "Open the payout account and go on to the provider's onboarding page",
  access: 'member',
  limit: 'write',
  answer: onboardingAnswer,
  handle: async ({ actor, res }) => {
    const accountId = await accountIdOf(actor);
    // A link serves once and for minutes only, so each request makes its own.
    const url = await asRefusal(() =>
      paymentClient().createAccountLink({
        accountId,
        refreshUrl: `${env.PUBLIC_URL}/account?payouts=again`,
        returnUrl: `${env.PUBLIC_URL}/account?payouts=returned`,
        idempotencyKey: `account-link:${randomUUID()}`,
      }),
    );
    res.json({ url });
  },
});

const refreshRoute = defineRoute({
  method: 'post',
  path: '/api/v1/me/payout-account/refresh',
  summary: 'Ask the provider how the payout account stands, after the return from its page',
  access: 'member',
  limit: 'write',
  answer: memberAnswer.shape.payouts,
  handle: async ({ actor, res }) => {
    const account = await PayoutAccount.findOne({ where: { memberId: actor.id } });
    const accountId = account?.providerAccountId ?? null;
    if (accountId !== null) {
      const reading = await asRefusal(() => paymentClient().readAccount(accountId));
      const locks = await locksOfAccount(accountId);
      await withTransaction(locks ?? {}, (unit) => applyAccount({ reading }, unit));
    }
    await account?.reload();
    res.json(present(account));
  },
});

export const onboardingRoutes: RouteDefinition[] = [startRoute, refreshRoute];
