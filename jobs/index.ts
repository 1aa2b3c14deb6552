import cron from 'node-cron';
import { sequelize } from '#server/database/connection.ts';
import '#server/models/index.ts';
import { logger } from '#server/logger.ts';
import { allJobs } from './all-jobs.ts';
import { runJob, type Job } from './run-job.ts';

/** Seconds into a cron expression; whole minutes beyond 59 seconds, daily beyond a day. */
export function cronExpression(everySeconds: number): string {
  if (everySeconds < 60) return `*/${everySeconds} * * * * *`;
  if (everySeconds < 3600) return `0 */${Math.trunc(everySeconds / 60)} * * * *`;
  if (everySeconds < 86_400) return `0 0 */${Math.trunc(everySeconds / 3600)} * * *`;
  return '0 10 0 * * *';
}

let isStopping = false;
const running = new Set<Promise<unknown>>();

/** A failed run is logged and the next poke tries again: what is due stays due in its table. */
function poke(job: Job): Promise<void> {
  if (isStopping) return Promise.resolve();
  const run = runJob(job).then(
    () => undefined,
    () => undefined,
  );
  running.add(run);
  return run.finally(() => running.delete(run));
}

for (const job of allJobs) {
  cron.schedule(cronExpression(job.everySeconds), () => poke(job), {
    noOverlap: true,
    timezone: 'UTC',
    name: job.name,
  });
}

// What waited while nothing ran is done at once, not at the next poke.
for (const job of allJobs) await poke(job);
logger.info({ jobs: allJobs.map((job) => job.name) }, 'jobs are running');
// The start waits for this word where it started us with a channel.
process.send?.('ready');

async function stop(signal: NodeJS.Signals): Promise<void> {
  logger.info({ signal }, 'stopping');
  isStopping = true;
  await cron.shutdown(5_000);
  await Promise.allSettled(running);
  await sequelize.close();
  process.exit(0);
}
process.once('SIGTERM', (signal) => void stop(signal));
process.once('SIGINT', (signal) => void stop(signal));
