import { withTransaction } from '#server/database/transaction.ts';
import { lotIdsWithFloor, pauseBelowFloor } from '#server/features/lots/pause-below-floor.ts';
import { newestQuotes, quoteRefs } from '#server/features/quotes/quote-queries.ts';
import { defineJob } from './run-job.ts';

const BATCH = 200;

/** Pauses the lots whose price has fallen below their floor at the newest fresh quotes; a stale quote pauses nothing. */
export const pauseBelowFloorJob = defineJob({
  name: 'pause-below-floor',
  everySeconds: 60,
  run: async ({ now, log }) => {
    const board = await newestQuotes(now);
    const quotes = quoteRefs(board).filter(({ metal }) => board.byMetal[metal]?.isFresh === true);
    let paused = 0;
    let failed = 0;
    let afterId = '';
    for (;;) {
      const ids = await lotIdsWithFloor(afterId, BATCH);
      for (const lotId of ids) {
        try {
          if (await withTransaction({ lots: [lotId] }, (unit) => pauseBelowFloor({ lotId, quotes }, unit)))
            paused += 1;
        } catch (error) {
          failed += 1;
          log.error({ err: error as Error, lotId }, 'lot not held against its floor');
        }
      }
      const last = ids.at(-1);
      if (ids.length < BATCH || last === undefined) return { paused, failed };
      afterId = last;
    }
  },
});
