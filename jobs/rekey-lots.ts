import { dayOf } from '#shared/calendar-day.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { lotIdsThatDriftDaily } from '#server/features/register/rank-lot.ts';
import { needsRekey, rekeyLot } from '#server/features/register/rekey-lot.ts';
import { dayRates } from '#server/features/quotes/quote-queries.ts';
import { defineJob } from './run-job.ts';

const BATCH = 200;

/**
 * Re-keys the lots that more than one metal is paid for in, at the day's first accepted rates. Poked every hour, so that a
 * start in the middle of a day or a late first quote is made good; a run that finds the keys right changes none.
 */
export const rekeyLotsJob = defineJob({
  name: 'rekey-lots',
  everySeconds: 3600,
  run: async ({ now, log }) => {
    const rates = await dayRates(dayOf(now));
    let changed = 0;
    let failed = 0;
    let afterId = '';
    for (;;) {
      const ids = await lotIdsThatDriftDaily(afterId, BATCH);
      for (const lotId of ids) {
        try {
          // Asked without the lock first: taking it writes the row, also where the keys stay.
          if (!(await withTransaction({}, (unit) => needsRekey({ lotId, rates }, unit)))) continue;
          if (await withTransaction({ lots: [lotId] }, (unit) => rekeyLot({ lotId, rates }, unit)))
            changed += 1;
        } catch (error) {
          failed += 1;
          log.error({ err: error as Error, lotId }, 'lot not re-keyed');
        }
      }
      const last = ids.at(-1);
      if (ids.length < BATCH || last === undefined) return { changed, failed };
      afterId = last;
    }
  },
});
