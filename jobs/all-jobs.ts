import { cancelUnshippedDealsJob } from './cancel-unshipped-deals.ts';
import { pollParcelsJob } from './poll-parcels.ts';
import { pollQuotesJob } from './poll-quotes.ts';
import { sendMailsJob } from './send-mails.ts';
import type { Job } from './run-job.ts';

/** Every job of the product; `npm run job -- <name>` runs one by hand. */
export const allJobs: readonly Job[] = [pollQuotesJob, pollParcelsJob, cancelUnshippedDealsJob, sendMailsJob];
