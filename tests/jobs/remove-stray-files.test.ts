import { access, utimes } from 'node:fs/promises';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { removeStrayFilesJob } from '#jobs/remove-stray-files.ts';
import { env } from '#server/env.ts';
import { photoSizeKey } from '#server/features/photos/photo-files.ts';
import { PHOTO_SIZES } from '#server/features/photos/process-photo.ts';
import { uploadPhoto } from '#server/features/photos/upload-photo.ts';
import { sequelize } from '#server/database/connection.ts';
import { newId } from '#server/database/ids.ts';
import { storage } from '#server/integrations/storage.ts';
import { logger } from '#server/logger.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import { buildLot } from '#tests/factories/build-lot.ts';
import { photoBytes } from '#tests/helpers/test-photo.ts';

const HOUR = 3_600_000;
const run = () => removeStrayFilesJob.run({ now: new Date(), log: logger });

async function isThere(key: string): Promise<boolean> {
  return access(path.join(env.STORAGE_DIR, key)).then(
    () => true,
    () => false,
  );
}

/** Bytes as a broken upload leaves them, so many hours ago. */
async function leave(key: string, hoursAgo: number): Promise<string> {
  await storage.put(key, Buffer.from('bytes'), 'application/octet-stream');
  const at = new Date(Date.now() - hoursAgo * HOUR);
  await utimes(path.join(env.STORAGE_DIR, key), at, at);
  return key;
}

async function photoFile(hoursAgo: number): Promise<StoredFile> {
  const lot = await buildLot({ state: 'draft' });
  const row = await uploadPhoto(lot.id, { name: 'a.jpg', content: await photoBytes() }, lot.seller);
  const file = await StoredFile.findByPk(row.fileId, { rejectOnEmpty: true });
  const at = new Date(Date.now() - hoursAgo * HOUR);
  await sequelize.query('UPDATE files SET created_at = ? WHERE id = ?', { replacements: [at, file.id] });
  for (const size of PHOTO_SIZES)
    await utimes(path.join(env.STORAGE_DIR, photoSizeKey(file.storageKey, size)), at, at);
  return file;
}

describe('removing stray files', () => {
  it('removes bytes without a row after a day, and leaves all that has one', async () => {
    const [photo, document, half, fresh] = [
      await leave(`photos/${newId()}/240.webp`, 25),
      await leave(`certificates/${newId()}/${newId()}`, 25),
      await leave(`photos/${newId()}/${newId()}.part`, 48),
      await leave(`photos/${newId()}/960.webp`, 23),
    ];
    const kept = await photoFile(25);
    const odd = await leave(`${kept.storageKey}/4000.webp`, 25);
    expect(await run()).toEqual({ removed: 4, reported: 0 });
    for (const key of [photo, document, half, odd]) expect(await isThere(key), key).toBe(false);
    expect(await isThere(fresh)).toBe(true);
    for (const size of PHOTO_SIZES) expect(await isThere(photoSizeKey(kept.storageKey, size))).toBe(true);
    expect(await run()).toEqual({ removed: 0, reported: 0 });
  });

  it('tells of a row without its bytes once, and keeps the row', async () => {
    const [old, recent] = [await photoFile(25), await photoFile(1)];
    for (const file of [old, recent]) await storage.remove(photoSizeKey(file.storageKey, 960));
    expect(await run()).toEqual({ removed: 0, reported: 1 });
    expect(await run()).toEqual({ removed: 0, reported: 0 });
    const entries = await AuditEntry.findAll({ where: { act: 'report-missing-file' } });
    expect(entries).toHaveLength(1);
    expect(entries[0]).toMatchObject({ subjectKind: 'file', subjectId: old.id, actorRole: 'house' });
    expect(entries[0]!.detail).toMatchObject({ missing: [photoSizeKey(old.storageKey, 960)] });
    expect(await StoredFile.findByPk(old.id)).not.toBeNull();
  });
});
