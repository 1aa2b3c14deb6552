import { setTimeout as sleep } from 'node:timers/promises';
import { minorToAmount } from '#shared/money.ts';
import { accountSumMinor } from '#server/features/ledger/ledger-queries.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import type { Check } from './check.ts';

/** Longer than a message or a task normally takes from the provider's books into ours. */
const SETTLING_MS = 5_000;
const LOOKS_MAX = 3;

async function difference(): Promise<{ ours: bigint; theirs: bigint }> {
  const { availableMinor, pendingMinor } = await paymentClient().readBalance();
  return { ours: await accountSumMinor({ kind: 'provider' }), theirs: availableMinor + pendingMinor };
}

/**
 * Our account of the provider is the provider's balance of us, pending included, to the cent. What is on its way between
 * the two books shows as a difference for a moment, so only one that stays the same over several looks is told.
 */
export function providerBalanceCheck(settlingMs = SETTLING_MS): Check {
  return {
    name: 'provider-balance',
    states: "Our account of the provider equals the provider's balance of us, to the cent.",
    async find() {
      let before: bigint | null = null;
      for (let look = 1; ; look += 1) {
        const { ours, theirs } = await difference();
        const gap = ours - theirs;
        if (gap === 0n) return [];
        if (before !== null && gap !== before && look < LOOKS_MAX) before = null;
        if (before === gap || look >= LOOKS_MAX) {
          return [`our books say ${minorToAmount(ours)}, the provider says ${minorToAmount(theirs)}`];
        }
        before = gap;
        await sleep(settlingMs);
      }
    },
  };
}
