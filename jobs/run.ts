import { sequelize } from '#server/database/connection.ts';
import '#server/models/index.ts';
import { allJobs } from './all-jobs.ts';
import { runJob } from './run-job.ts';

const name = process.argv[2];
const job = allJobs.find((candidate) => candidate.name === name);
if (job === undefined) {
  process.stderr.write(`Which job? One of:\n${allJobs.map((known) => `  ${known.name}`).join('\n')}\n`);
  process.exitCode = 1;
} else {
  const detail = await runJob(job);
  process.stdout.write(
    `${job.name}: ${detail === null ? 'another runner has it' : JSON.stringify(detail)}\n`,
  );
}
await sequelize.close();
