import { withTransaction } from '#server/database/transaction.ts';
import { expectedKeys } from '#server/features/stored-files/expected-keys.ts';
import { filesBefore, withoutRow } from '#server/features/stored-files/file-queries.ts';
import { reportMissingFile } from '#server/features/stored-files/report-missing-file.ts';
import { storage } from '#server/integrations/storage.ts';
import { defineJob, type JobContext } from './run-job.ts';

/** An upload writes its bytes before its rows; after this long nobody is between the two any more. */
const SETTLED_HOURS = 24;
const BATCH = 200;

async function removeAll(keys: readonly string[], { log }: JobContext): Promise<number> {
  for (const key of keys) {
    await storage.remove(key);
    log.info({ key }, 'bytes without a row removed');
  }
  return keys.length;
}

/** Removes old objects without a row; answers how many, and the keys of all that stay. */
async function removeStray(before: Date, context: JobContext) {
  const kept = new Set<string>();
  let removed = 0;
  let batch: string[] = [];
  const sweep = async () => {
    const stray = await withoutRow(batch);
    removed += await removeAll(stray, context);
    batch = [];
  };
  for await (const { key, changedAt } of storage.list()) {
    kept.add(key);
    if (changedAt >= before) continue;
    batch.push(key);
    if (batch.length >= BATCH) await sweep();
  }
  await sweep();
  return { removed, kept };
}

async function reportMissing(before: Date, kept: ReadonlySet<string>): Promise<number> {
  let reported = 0;
  for (let afterId = ''; ;) {
    const files = await filesBefore(before, afterId, BATCH);
    for (const file of files) {
      const missing = expectedKeys(file).filter((key) => !kept.has(key));
      if (missing.length === 0) continue;
      if (await withTransaction({}, (unit) => reportMissingFile({ file, missing }, unit))) reported += 1;
    }
    const last = files.at(-1);
    if (last === undefined || files.length < BATCH) return reported;
    afterId = last.id;
  }
}

/**
 * Holds the stored bytes against the rows of files: what has no row and is older than a day goes, what has a row and is
 * not there is told to the admins.
 */
export const removeStrayFilesJob = defineJob({
  name: 'remove-stray-files',
  everySeconds: 86_400,
  run: async (context) => {
    const before = new Date(context.now.getTime() - SETTLED_HOURS * 3_600_000);
    const { removed, kept } = await removeStray(before, context);
    return { removed, reported: await reportMissing(before, kept) };
  },
});
