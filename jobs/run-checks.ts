import type { Check } from './checks/check.ts';
import { dealSumsCheck } from './checks/deal-sums.ts';
import { escrowEndedCheck } from './checks/escrow-ended.ts';
import { ledgerBalancesCheck } from './checks/ledger-balances.ts';
import { providerBalanceCheck } from './checks/provider-balance.ts';
import { singleReleaseCheck } from './checks/single-release.ts';
import { defineJob } from './run-job.ts';

/** Everything that must always hold, one invariant a file. */
export const allChecks: readonly Check[] = [
  ledgerBalancesCheck,
  escrowEndedCheck,
  dealSumsCheck,
  singleReleaseCheck,
  providerBalanceCheck(),
];

/** Looks for what must not be. A breach is logged as an error and stays in the job's record for the admins. */
export const runChecksJob = defineJob({
  name: 'run-checks',
  everySeconds: 3600,
  async run({ log }) {
    const breaches: Record<string, string[]> = {};
    for (const check of allChecks) {
      const found = await check.find();
      if (found.length === 0) continue;
      breaches[check.name] = found.slice(0, 20);
      log.error({ check: check.name, found: found.slice(0, 20), count: found.length }, check.states);
    }
    return { checks: allChecks.length, breaches };
  },
});
