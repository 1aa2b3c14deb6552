import { withTransaction } from '#server/database/transaction.ts';
import { closeLot, lotIdsToClose } from '#server/features/lots/close-lot.ts';
import { defineJob } from './run-job.ts';

const BATCH = 200;

/** Closes every lot whose day has come, one transaction each, so that one that cannot be closed holds up no other. */
export const closeLotsJob = defineJob({
  name: 'close-lots',
  everySeconds: 60,
  run: async ({ now, log }) => {
    let closed = 0;
    let failed = 0;
    for (const lotId of await lotIdsToClose(now, BATCH)) {
      try {
        if (await withTransaction({ lots: [lotId] }, (unit) => closeLot({ lotId }, unit))) closed += 1;
      } catch (error) {
        failed += 1;
        log.error({ err: error as Error, lotId }, 'lot not closed');
      }
    }
    return { closed, failed };
  },
});
