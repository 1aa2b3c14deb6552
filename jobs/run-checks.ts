import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import type { Check } from './checks/check.ts';
import { dealSumsCheck } from './checks/deal-sums.ts';
import { escrowEndedCheck } from './checks/escrow-ended.ts';
import { ledgerBalancesCheck } from './checks/ledger-balances.ts';
import { providerBalanceCheck } from './checks/provider-balance.ts';
import { sheetRecomputesCheck } from './checks/sheet-recomputes.ts';
import { singleReleaseCheck } from './checks/single-release.ts';
import { defineJob } from './run-job.ts';

/** Everything that must always hold, one invariant a file. */
export const allChecks: readonly Check[] = [
  ledgerBalancesCheck,
  escrowEndedCheck,
  dealSumsCheck,
  singleReleaseCheck,
  sheetRecomputesCheck,
  providerBalanceCheck(),
];

/** Null where the provider could not be asked: that says nothing of the books, and the other checks go on. */
async function look(check: Check): Promise<string[] | null> {
  try {
    return await check.find();
  } catch (error) {
    if (error instanceof PaymentProviderError) return null;
    throw error;
  }
}

/** Looks for what must not be. A breach is logged as an error and stays in the job's record for the admins. */
export const runChecksJob = defineJob({
  name: 'run-checks',
  everySeconds: 3600,
  async run({ log }) {
    const breaches: Record<string, string[]> = {};
    const unanswered: string[] = [];
    for (const check of allChecks) {
      const found = await look(check);
      if (found === null) unanswered.push(check.name);
      if (found === null || found.length === 0) continue;
      breaches[check.name] = found.slice(0, 20);
      log.error({ check: check.name, found: found.slice(0, 20), count: found.length }, check.states);
    }
    return { checks: allChecks.length, breaches, unanswered };
  },
});
