import { createReadStream } from 'node:fs';
import { access, mkdir, readdir, rename, rm, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { randomUUID } from 'node:crypto';
import type { Readable } from 'node:stream';
import { AppError, invariant } from '#server/app-error.ts';
import { env } from '#server/env.ts';

/** Where photos and documents lie. Keys are made by the product, never by a visitor. */
export type Storage = {
  /** Writes the whole object or nothing. Throws `storage-full`. */
  put(key: string, content: Buffer, mediaType: string): Promise<void>;
  /** The object's bytes, or null when there is none. */
  get(key: string): Promise<Readable | null>;
  /** Removes the object; no complaint when it is gone already. */
  remove(key: string): Promise<void>;
  /** Every object, halves of broken writes included, and when it was written last; in no order. */
  list(): AsyncIterable<StoredObject>;
};

export type StoredObject = { key: string; changedAt: Date };

const KEY = /^[a-z0-9]+(?:[/_-][a-z0-9]+)*(?:\.[a-z0-9]+)?$/;

function assertKey(key: string): void {
  invariant(key.length <= 160 && KEY.test(key), `a storage key cannot be ${JSON.stringify(key)}`);
}

function codeOf(error: unknown): unknown {
  return (error as { code?: unknown } | null)?.code;
}

async function* filesUnder(folder: string): AsyncGenerator<string> {
  const entries = await readdir(folder, { withFileTypes: true }).catch((error: unknown) => {
    if (codeOf(error) === 'ENOENT') return [];
    throw error;
  });
  for (const entry of entries) {
    const place = path.join(folder, entry.name);
    if (entry.isDirectory()) yield* filesUnder(place);
    else if (entry.isFile()) yield place;
  }
}

/** A folder on this machine. A file appears under its name only when it is complete. */
export function createFolderStorage(folder: string): Storage {
  const fileOf = (key: string) => {
    assertKey(key);
    return path.join(folder, key);
  };
  return {
    async put(key, content) {
      const file = fileOf(key);
      const half = path.join(path.dirname(file), `${randomUUID()}.part`);
      try {
        await mkdir(path.dirname(file), { recursive: true });
        await writeFile(half, content, { flush: true });
        await rename(half, file);
      } catch (error) {
        await rm(half, { force: true }).catch(() => undefined);
        if (codeOf(error) === 'ENOSPC' || codeOf(error) === 'EDQUOT') throw new AppError('storage-full');
        throw error;
      }
    },
    async get(key) {
      const file = fileOf(key);
      try {
        await access(file);
      } catch (error) {
        if (codeOf(error) === 'ENOENT') return null;
        throw error;
      }
      return createReadStream(file);
    },
    async remove(key) {
      await rm(fileOf(key), { force: true });
    },
    async *list() {
      for await (const file of filesUnder(folder)) {
        const key = path.relative(folder, file).split(path.sep).join('/');
        const found = await stat(file).catch(() => null);
        if (found !== null && KEY.test(key)) yield { key, changedAt: found.mtime };
      }
    },
  };
}

/** Any service that speaks the S3 protocol; the SDK is loaded only where it is used. */
export function createBucketStorage(bucket: string): Storage {
  const load = async () => {
    const sdk = await import('@aws-sdk/client-s3');
    const client = new sdk.S3Client({
      region: env.S3_REGION,
      credentials: { accessKeyId: env.S3_ACCESS_KEY_ID, secretAccessKey: env.S3_SECRET_ACCESS_KEY },
      ...(env.S3_ENDPOINT === '' ? {} : { endpoint: env.S3_ENDPOINT, forcePathStyle: true }),
    });
    return { sdk, client };
  };
  let loaded: ReturnType<typeof load> | null = null;
  const ready = () => (loaded ??= load());
  return {
    async put(key, content, mediaType) {
      assertKey(key);
      const { sdk, client } = await ready();
      await client.send(
        new sdk.PutObjectCommand({ Bucket: bucket, Key: key, Body: content, ContentType: mediaType }),
      );
    },
    async get(key) {
      assertKey(key);
      const { sdk, client } = await ready();
      try {
        const answer = await client.send(new sdk.GetObjectCommand({ Bucket: bucket, Key: key }));
        return (answer.Body as Readable | undefined) ?? null;
      } catch (error) {
        if (error instanceof sdk.NoSuchKey) return null;
        throw error;
      }
    },
    async remove(key) {
      assertKey(key);
      const { sdk, client } = await ready();
      await client.send(new sdk.DeleteObjectCommand({ Bucket: bucket, Key: key }));
    },
    async *list() {
      const { sdk, client } = await ready();
      for (let from: string | undefined; ;) {
        const order = { Bucket: bucket, ...(from === undefined ? {} : { ContinuationToken: from }) };
        const page = await client.send(new sdk.ListObjectsV2Command(order));
        for (const { Key: key, LastModified: changedAt } of page.Contents ?? []) {
          if (key !== undefined && changedAt !== undefined && KEY.test(key)) yield { key, changedAt };
        }
        from = page.NextContinuationToken;
        if (from === undefined) return;
      }
    },
  };
}

export const storage: Storage =
  env.S3_BUCKET === '' ? createFolderStorage(env.STORAGE_DIR) : createBucketStorage(env.S3_BUCKET);
