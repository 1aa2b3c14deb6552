import { mkdtemp, readdir, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { buffer } from 'node:stream/consumers';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createFolderStorage, type Storage } from '#server/integrations/storage.ts';

let folder: string;
let storage: Storage;
beforeEach(async () => {
  folder = await mkdtemp(path.join(os.tmpdir(), 'storage-'));
  storage = createFolderStorage(folder);
});
afterEach(() => rm(folder, { recursive: true, force: true }));

async function read(key: string): Promise<string | null> {
  const stream = await storage.get(key);
  return stream === null ? null : (await buffer(stream)).toString();
}

describe('the folder', () => {
  it('gives back what was put, replaces it, and forgets what was removed', async () => {
    await storage.put('photos/a/240.webp', Buffer.from('first'), 'image/webp');
    await storage.put('photos/a/240.webp', Buffer.from('second'), 'image/webp');
    expect(await read('photos/a/240.webp')).toBe('second');
    await storage.remove('photos/a/240.webp');
    await storage.remove('photos/a/240.webp');
    expect(await read('photos/a/240.webp')).toBeNull();
  });

  it('leaves no half-written file behind', async () => {
    await storage.put('photos/a/240.webp', Buffer.from('whole'), 'image/webp');
    expect(await readdir(path.join(folder, 'photos/a'))).toEqual(['240.webp']);
  });

  it.each(['../secret', '/etc/passwd', 'a//b', 'a/../b', 'A', 'a/.b', ''])(
    'takes no key like %j',
    async (key) => {
      await expect(storage.put(key, Buffer.from('x'), 'text/plain')).rejects.toThrow('storage key');
      await expect(storage.get(key)).rejects.toThrow('storage key');
    },
  );
});
