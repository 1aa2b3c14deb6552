import { withTransaction } from '#server/database/transaction.ts';
import { endPastFix } from '#server/features/price-fixes/end-price-fix.ts';
import { fixesPast } from '#server/features/price-fixes/price-fix-queries.ts';
import { defineJob } from './run-job.ts';

const BATCH = 200;

/** Offers the lots again whose price fix has run out, one transaction each. */
export const endPriceFixesJob = defineJob({
  name: 'end-price-fixes',
  everySeconds: 15,
  run: async ({ now, log }) => {
    let ended = 0;
    let failed = 0;
    for (const { lotId } of await fixesPast(now, BATCH)) {
      try {
        if (await withTransaction({ lots: [lotId] }, (unit) => endPastFix({ lotId }, unit))) ended += 1;
      } catch (error) {
        failed += 1;
        log.error({ err: error as Error, lotId }, 'price fix not ended');
      }
    }
    return { ended, failed };
  },
});
