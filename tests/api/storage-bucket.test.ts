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
});
