import { withTransaction } from '#server/database/transaction.ts';
import { findFollowedParcels } from '#server/features/parcels/parcel-queries.ts';
import { recordTracking } from '#server/features/parcels/record-tracking.ts';
import { CarrierServiceError } from '#server/integrations/carrier.ts';
import { carrierClient } from '#server/integrations/clients.ts';
import { defineJob, type JobContext } from './run-job.ts';

const PARCELS_MAX = 200;

/** Asks the carrier, then takes each answer over in its own transaction; one bad answer does not hold up the others. */
export async function pollParcels({ log }: Pick<JobContext, 'log'>): Promise<Record<string, unknown>> {
  const parcels = await findFollowedParcels(PARCELS_MAX);
  const counts: Record<string, number> = { asked: parcels.length };
  const count = (name: string) => (counts[name] = (counts[name] ?? 0) + 1);
  for (const { dealId, carrier, trackingNumber } of parcels) {
    try {
      const tracker = await carrierClient().readTracker(carrier, trackingNumber);
      if (tracker === null) {
        count('unknown');
        continue;
      }
      count(await withTransaction({ deals: [dealId] }, (unit) => recordTracking(dealId, tracker, unit)));
    } catch (error) {
      if (!(error instanceof CarrierServiceError)) throw error;
      log.warn({ dealId, reason: error.reason }, 'the carrier did not answer');
      count('unanswered');
    }
  }
  return counts;
}

export const pollParcelsJob = defineJob({ name: 'poll-parcels', everySeconds: 20, run: pollParcels });
