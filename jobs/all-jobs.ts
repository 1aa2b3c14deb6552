import { cancelUnshippedDealsJob } from './cancel-unshipped-deals.ts';
import { pollParcelsJob } from './poll-parcels.ts';
import { pollQuotesJob } from './poll-quotes.ts';
import { sendMailsJob } from './send-mails.ts';
import { lapseUnfundedDealsJob } from './lapse-unfunded-deals.ts';
import { performProviderTasksJob } from './perform-provider-tasks.ts';
import { reconcilePaymentsJob } from './reconcile-payments.ts';
import { runChecksJob } from './run-checks.ts';
import { endPriceFixesJob } from './end-price-fixes.ts';
import { closeLotsJob } from './close-lots.ts';
import { pauseBelowFloorJob } from './pause-below-floor.ts';
import { rekeyLotsJob } from './rekey-lots.ts';
import { removeStrayFilesJob } from './remove-stray-files.ts';
import type { Job } from './run-job.ts';

/** Every job of the product; `npm run job -- <name>` runs one by hand. */
export const allJobs: readonly Job[] = [
  pollQuotesJob,
  pollParcelsJob,
  cancelUnshippedDealsJob,
  sendMailsJob,
  performProviderTasksJob,
  lapseUnfundedDealsJob,
  reconcilePaymentsJob,
  runChecksJob,
  closeLotsJob,
  endPriceFixesJob,
  pauseBelowFloorJob,
  rekeyLotsJob,
  removeStrayFilesJob,
];
