import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';
import { afterAll, describe, expect, it } from 'vitest';

/** The little of the S3 protocol that is used here: an object by its path. */
const objects = new Map<string, { content: Buffer; type: string }>();
const service = createServer((req, res) => {
  void (async () => {
    const name = new URL(req.url ?? '', 'http://bucket.example').pathname;
    if (!(req.headers.authorization ?? '').startsWith('AWS4-HMAC-SHA256')) return res.writeHead(403).end();
    if (req.method === 'PUT') {
      objects.set(name, { content: await buffer(req), type: req.headers['content-type'] ?? '' });
      return res.writeHead(200).end();
    }
    if (req.method === 'DELETE') {
      objects.delete(name);
      return res.writeHead(204).end();
    }
    const { searchParams } = new URL(req.url ?? '', 'http://bucket.example');
    if (searchParams.get('list-type') === '2') {
      // One object a page, so that the next page is asked for.
      const keys = [...objects.keys()].map((key) => key.replace('/lots/', '')).sort();
      const at = keys.indexOf(searchParams.get('continuation-token') ?? keys[0] ?? '');
      const next = keys[at + 1];
      const entry = `<Contents><Key>${keys[at]}</Key><LastModified>2026-12-01T08:00:00.000Z</LastModified></Contents>`;
      const more = next === undefined ? '' : `<NextContinuationToken>${next}</NextContinuationToken>`;
      const list = `<ListBucketResult><IsTruncated>${next !== undefined}</IsTruncated>${more}${entry}</ListBucketResult>`;
      return res.writeHead(200, { 'Content-Type': 'application/xml' }).end(`<?xml version="1.0"?>${list}`);
    }
    const found = objects.get(name);
    if (found !== undefined) return res.writeHead(200, { 'Content-Type': found.type }).end(found.content);
    const missing = '<?xml version="1.0"?><Error><Code>NoSuchKey</Code></Error>';
    return res.writeHead(404, { 'Content-Type': 'application/xml' }).end(missing);
  })();
});
await new Promise<void>((resolve) => service.listen(0, '127.0.0.1', resolve));
afterAll(() => new Promise((resolve) => service.close(resolve)));

// Read once, with the module, and therefore set before it.
Object.assign(process.env, {
  S3_BUCKET: 'lots',
  S3_ENDPOINT: `http://127.0.0.1:${(service.address() as AddressInfo).port}`,
  S3_ACCESS_KEY_ID: 'test-key',
  S3_SECRET_ACCESS_KEY: 'test-secret',
  AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
});
const { storage } = await import('#server/integrations/storage.ts');

describe('a bucket', () => {
  it('is used where one is configured, and answers like the folder', async () => {
    await storage.put('photos/a/240.webp', Buffer.from('a photo'), 'image/webp');
    expect(objects.get('/lots/photos/a/240.webp')).toEqual({
      content: Buffer.from('a photo'),
      type: 'image/webp',
    });
    const stream = await storage.get('photos/a/240.webp');
    expect((await buffer(stream!)).toString()).toBe('a photo');
    await storage.remove('photos/a/240.webp');
    expect(await storage.get('photos/a/240.webp')).toBeNull();
    await expect(storage.put('../secret', Buffer.from('x'), 'text/plain')).rejects.toThrow('storage key');
  });

  it('lists its objects page by page', async () => {
    for (const key of ['photos/b/240.webp', 'photos/a/240.webp', 'certificates/c/d']) {
      await storage.put(key, Buffer.from('x'), 'image/webp');
    }
    const listed = [];
    for await (const { key, changedAt } of storage.list()) listed.push([key, changedAt.toISOString()]);
    const at = '2026-12-01T08:00:00.000Z';
    expect(listed).toEqual([
      ['certificates/c/d', at],
      ['photos/a/240.webp', at],
      ['photos/b/240.webp', at],
    ]);
  });
});
