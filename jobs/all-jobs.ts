import { pollQuotesJob } from './poll-quotes.ts';
import type { Job } from './run-job.ts';

/** Every job of the product; `npm run job -- <name>` runs one by hand. */
export const allJobs: readonly Job[] = [pollQuotesJob];
