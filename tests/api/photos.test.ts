import { readdir } from 'node:fs/promises';
import path from 'node:path';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { PHOTO_BYTES_MAX } from '#shared/limits.ts';
import { lotAnswer, photoAnswer, type PhotoAnswer } from '#shared/schemas/lots.ts';
import { env } from '#server/env.ts';
import { tidyFileName } from '#server/middleware/receive-file.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import { buildDeal } from '#tests/factories/build-deal.ts';
import { buildLot, pdfBytes } from '#tests/factories/build-lot.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { photoBytes } from '#tests/helpers/test-photo.ts';
import { startTestApp, type TestApp, type Visitor } from '#tests/helpers/test-app.ts';

let app: TestApp;
let seller: BuiltMember;
let asSeller: Visitor;
let asStranger: Visitor;
let passerBy: Visitor;

beforeAll(async () => {
  app = await startTestApp();
  seller = await buildMember({ canSell: true });
  asSeller = await app.signIn(seller);
  asStranger = await app.signIn(await buildMember());
  passerBy = await app.visitor();
});

async function newCode(): Promise<string> {
  return lotAnswer.parse((await asSeller.post('/api/v1/lots').expect(201)).body).code;
}

async function send(visitor: Visitor, url: string, content: Buffer, name = 'photo.jpg', type?: string) {
  const { csrfToken } = await visitor.refreshToken();
  const options = type === undefined ? name : { filename: name, contentType: type };
  return visitor.agent.post(url).set('X-CSRF-Token', csrfToken).attach('file', content, options);
}

const addPhoto = (code: string, content: Buffer, name?: string, type?: string) =>
  send(asSeller, `/api/v1/lots/${code}/photos`, content, name, type);

/** Every file in the storage of this test file's server. */
async function storedFiles(): Promise<string[]> {
  const found = await readdir(env.STORAGE_DIR, { recursive: true, withFileTypes: true });
  return found
    .filter((entry) => entry.isFile())
    .map((entry) => path.join(entry.parentPath, entry.name))
    .sort();
}

const traces = async () => ({
  files: await storedFiles(),
  fileRows: await StoredFile.count(),
  photoRows: await LotPhoto.count(),
});

const bytesOf = async (visitor: Visitor, url: string): Promise<Buffer> => {
  const { body } = await visitor.agent.get(url).responseType('blob').expect(200);
  return body as Buffer;
};

describe('adding a photo', () => {
  it('keeps three sizes, upright and without the camera’s metadata', async () => {
    const code = await newCode();
    const before = (await storedFiles()).length;
    const content = await photoBytes({ width: 2400, height: 1200, orientation: 6 });
    expect((await sharp(content).metadata()).exif).toBeDefined();
    const { status, body } = await addPhoto(code, content);
    expect(status).toBe(201);
    const photo = photoAnswer.parse(body);
    expect([photo.width, photo.height]).toEqual([1000, 2000]);
    expect((await storedFiles()).length).toBe(before + 3);
    for (const [url, longest] of [
      [photo.thumb, 240],
      [photo.medium, 960],
      [photo.large, 2000],
    ] as const) {
      const bytes = await bytesOf(asSeller, url);
      const found = await sharp(bytes).metadata();
      expect([found.format, found.height, found.width]).toEqual(['webp', longest, longest / 2]);
      expect([found.exif, found.orientation, found.xmp]).toEqual([undefined, undefined, undefined]);
      expect(bytes.includes('SecretCamera')).toBe(false);
    }
  });

  it.each(['jpeg', 'png', 'webp'] as const)('takes a %s, whatever it is called', async (format) => {
    const { status } = await addPhoto(
      await newCode(),
      await photoBytes({ format }),
      'scan.pdf',
      'text/plain',
    );
    expect(status).toBe(201);
  });

  it('does not enlarge a small one', async () => {
    const { body } = await addPhoto(await newCode(), await photoBytes({ width: 120, height: 80 }));
    expect([body.width, body.height]).toEqual([120, 80]);
  });

  it('puts each after the last, and stops at twelve even when they come at once', async () => {
    const code = await newCode();
    const content = await photoBytes({ width: 40, height: 40 });
    for (let count = 0; count < 11; count += 1) await addPhoto(code, content);
    const answers = await Promise.all([addPhoto(code, content), addPhoto(code, content)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    const before = await traces();
    expect((await addPhoto(code, content)).body.code).toBe('photo-limit-reached');
    expect(await traces()).toEqual(before);
    const { body } = await asSeller.get(`/api/v1/lots/${code}`);
    expect(body.photos).toHaveLength(12);
  });
});

describe('refusing a photo', () => {
  const svg = Buffer.from(
    '<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"><script>alert(1)</script></svg>',
  );
  const refused: [string, () => Promise<Buffer>, string, number, string][] = [
    ['an SVG', async () => svg, 'drawing.svg', 415, 'photo-not-an-image'],
    ['an SVG named .jpg', async () => svg, 'drawing.jpg', 415, 'photo-not-an-image'],
    ['a PDF named .jpg', async () => pdfBytes(), 'report.jpg', 415, 'photo-not-an-image'],
    ['a GIF', () => photoBytes({ format: 'gif' }), 'moving.gif', 415, 'photo-not-an-image'],
    ['text', async () => Buffer.from('not a photo'), 'photo.jpg', 415, 'photo-not-an-image'],
    ['an empty file', async () => Buffer.alloc(0), 'photo.jpg', 415, 'photo-not-an-image'],
    ['30 MB', async () => Buffer.alloc(30 * 1024 * 1024, 1), 'huge.jpg', 413, 'photo-too-large'],
    [
      'one byte too many',
      async () => Buffer.alloc(PHOTO_BYTES_MAX + 1, 1),
      'big.jpg',
      413,
      'photo-too-large',
    ],
    [
      'half a JPEG',
      async () => {
        const whole = await photoBytes({ width: 900, height: 900 });
        return whole.subarray(0, whole.length / 2);
      },
      'half.jpg',
      422,
      'photo-broken',
    ],
    [
      'a head without a body',
      async () => Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 16]),
      'head.jpg',
      422,
      'photo-broken',
    ],
    [
      'more pixels than are decoded',
      () => photoBytes({ width: 12_000, height: 5_001, format: 'png' }),
      'wide.png',
      413,
      'photo-too-large',
    ],
  ];
  it.each(refused)('refuses %s and leaves no trace', async (_, make, name, status, code) => {
    const lot = await newCode();
    const content = await make();
    const before = await traces();
    const answer = await addPhoto(lot, content, name, 'image/jpeg');
    expect([answer.status, answer.body.code]).toEqual([status, code]);
    expect(answer.type).toBe('application/problem+json');
    expect(await traces()).toEqual(before);
  });

  it('refuses a form without a file, two files, and a body that is no form', async () => {
    const code = await newCode();
    const { csrfToken } = await asSeller.refreshToken();
    const url = `/api/v1/lots/${code}/photos`;
    const form = () => asSeller.agent.post(url).set('X-CSRF-Token', csrfToken);
    const empty = await form().field('note', 'nothing');
    expect([empty.status, empty.body.errors[0].code]).toEqual([422, 'file-missing']);
    const content = await photoBytes();
    const two = await form().attach('file', content, 'a.jpg').attach('more', content, 'b.jpg');
    expect(two.status).toBe(400);
    expect((await form().send({ file: 'x' })).status).toBe(422);
  });

  it('refuses it without the page’s token, from another, and once the lot is submitted', async () => {
    const content = await photoBytes();
    const code = await newCode();
    await asSeller.agent.post(`/api/v1/lots/${code}/photos`).attach('file', content, 'a.jpg').expect(403);
    expect((await send(asStranger, `/api/v1/lots/${code}/photos`, content)).status).toBe(404);
    const open = await buildLot({ state: 'open', sellerId: seller.id });
    expect((await addPhoto(open.code, content)).body.code).toBe('illegal-transition');
    expect((await send(asStranger, `/api/v1/lots/${open.code}/photos`, content)).status).toBe(403);
  });
});

describe('the photos of a draft', () => {
  async function withPhotos(count: number): Promise<{ code: string; photos: PhotoAnswer[] }> {
    const code = await newCode();
    const content = await photoBytes({ width: 40, height: 40 });
    const photos = [];
    for (let made = 0; made < count; made += 1)
      photos.push(photoAnswer.parse((await addPhoto(code, content)).body));
    return { code, photos };
  }
  const idsOf = (photos: readonly PhotoAnswer[]) => photos.map(({ id }) => id);

  it('are put in order, each named once', async () => {
    const { code, photos } = await withPhotos(3);
    const photoIds = idsOf(photos).reverse();
    const { body } = await asSeller.put(`/api/v1/lots/${code}/photos/order`, { photoIds }).expect(200);
    expect(idsOf(body.photos)).toEqual(photoIds);
    for (const wrong of [
      photoIds.slice(1),
      [...photoIds, photoIds[0]],
      [photoIds[0], photoIds[0], photoIds[1]],
    ]) {
      const answer = await asSeller.put(`/api/v1/lots/${code}/photos/order`, { photoIds: wrong }).expect(422);
      expect(answer.body.errors[0].pointer).toBe('/photoIds');
    }
  });

  it('carry captions', async () => {
    const { code, photos } = await withPhotos(1);
    const url = `/api/v1/lots/${code}/photos/${photos[0]!.id}/caption`;
    const { body } = await asSeller.put(url, { caption: ' On the balance ' }).expect(200);
    expect(body.photos[0].caption).toBe('On the balance');
    await asSeller.put(url, { caption: 'x'.repeat(201) }).expect(422);
    await asStranger.put(url, { caption: 'mine' }).expect(404);
  });

  it('are removed with their bytes', async () => {
    const { code, photos } = await withPhotos(2);
    const before = await storedFiles();
    const [first, second] = idsOf(photos);
    const { body } = await asSeller.delete(`/api/v1/lots/${code}/photos/${first}`).expect(200);
    expect(idsOf(body.photos)).toEqual([second]);
    expect((await storedFiles()).length).toBe(before.length - 3);
    await asSeller.get(`/api/v1/photos/${first}/240`).expect(404);
    await asSeller.delete(`/api/v1/lots/${code}/photos/${first}`).expect(404);
    await asStranger.delete(`/api/v1/lots/${code}/photos/${second}`).expect(404);
  });

  it('do not disturb a save of the draft, and go with the draft', async () => {
    const before = await storedFiles();
    const { code } = await withPhotos(1);
    const { body } = await asSeller.get(`/api/v1/lots/${code}`);
    await asSeller.put(`/api/v1/lots/${code}/draft`, { draft: body.draft, version: 0 }).expect(200);
    await asSeller.delete(`/api/v1/lots/${code}/draft`).expect(204);
    expect(await storedFiles()).toEqual(before);
  });
});

describe('showing a photo', () => {
  it('is for whoever sees the lot, and cached for ever only when anyone may', async () => {
    const code = await newCode();
    const { body } = await addPhoto(code, await photoBytes());
    const url = body.medium as string;
    expect((await asSeller.get(url).expect(200)).headers['cache-control']).toBe('private, no-store');
    await passerBy.get(url).expect(404);
    await asStranger.get(url).expect(404);
    await Lot.update({ state: 'open' }, { where: { code } });
    const { headers } = await passerBy.get(url).expect(200);
    expect(headers).toMatchObject({
      'content-type': 'image/webp',
      'cache-control': 'public, max-age=31536000, immutable',
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
    });
    expect(headers['set-cookie']).toBeUndefined();
  });

  it('answers 404 for a size or a photo that there is not', async () => {
    const { body } = await addPhoto(await newCode(), await photoBytes());
    await asSeller.get(`/api/v1/photos/${body.id as string}/500`).expect(404);
    await asSeller.get('/api/v1/photos/0193a1f0-0000-7000-8000-000000000001/240').expect(404);
    await asSeller.get('/api/v1/photos/..%2F..%2Fetc/240').expect(404);
  });
});

describe('a certificate’s document', () => {
  const attach = (code: string, content: Buffer, name = 'report.pdf') =>
    send(asSeller, `/api/v1/lots/${code}/certificate`, content, name);

  it('is taken as PDF, JPEG or PNG by its bytes, and the draft refers to it', async () => {
    const code = await newCode();
    for (const [content, mediaType] of [
      [pdfBytes(), 'application/pdf'],
      [await photoBytes(), 'image/jpeg'],
      [await photoBytes({ format: 'png' }), 'image/png'],
    ] as const) {
      const { status, body } = await attach(code, content, 'scan.txt');
      expect([status, body.mediaType, body.byteCount]).toEqual([201, mediaType, content.byteLength]);
      const draft = (await asSeller.get(`/api/v1/lots/${code}`)).body.draft;
      expect(draft.certificate).toMatchObject({ fileId: body.fileId, fileName: 'scan.txt' });
    }
  });

  it('replaces the one before, row and bytes', async () => {
    const code = await newCode();
    await attach(code, pdfBytes());
    const before = await traces();
    await attach(code, pdfBytes());
    const after = await traces();
    expect([after.fileRows, after.files.length]).toEqual([before.fileRows, before.files.length]);
  });

  it.each([
    ['an SVG', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'), 415, 'document-not-accepted'],
    ['HTML named .pdf', Buffer.from('<html><script>alert(1)</script></html>'), 415, 'document-not-accepted'],
    ['11 MB', Buffer.alloc(11 * 1024 * 1024, 1), 413, 'document-too-large'],
  ])('refuses %s', async (_, content, status, code) => {
    const lot = await newCode();
    const before = await traces();
    const answer = await attach(lot, content);
    expect([answer.status, answer.body.code]).toEqual([status, code]);
    expect(await traces()).toEqual(before);
  });

  const documentOf = async (lotId: string) => {
    const { id } = await Certificate.findOne({ where: { lotId }, rejectOnEmpty: true });
    return `/api/v1/certificates/${id}/document`;
  };

  it('is read by seller and desk, and by nobody else', async () => {
    const lot = await buildLot({ state: 'open', sellerId: seller.id });
    const { id } = await Certificate.findOne({ where: { lotId: lot.id }, rejectOnEmpty: true });
    const url = `/api/v1/certificates/${id}/document`;
    const asDesk = await app.signIn(await buildMember({ role: 'desk' }));
    for (const visitor of [asSeller, asDesk]) {
      const { headers } = await visitor.get(url).expect(200);
      expect(headers).toMatchObject({
        'content-type': 'application/pdf',
        'cache-control': 'private, no-store',
        'x-content-type-options': 'nosniff',
        'x-frame-options': 'SAMEORIGIN',
        'content-disposition': `inline; filename="report.pdf"; filename*=UTF-8''report.pdf`,
      });
      expect(headers['content-security-policy']).toContain("frame-ancestors 'self'");
    }
    await passerBy.get(url).expect(401);
    await asStranger.get(url).expect(403);
    const hidden = await buildLot({ state: 'submitted' });
    const other = await Certificate.findOne({ where: { lotId: hidden.id }, rejectOnEmpty: true });
    await asStranger.get(`/api/v1/certificates/${other.id}/document`).expect(404);
  });

  it('is read by the buyer from funding on, not before', async () => {
    for (const role of ['member', 'desk'] as const) {
      for (const [state, status] of [
        ['agreed', 403],
        ['funded', 200],
        ['settled', 200],
      ] as const) {
        const deal = await buildDeal({ state, buyer: await buildMember({ role }) });
        await (await app.signIn(deal.buyer)).get(await documentOf(deal.lot.id)).expect(status);
      }
    }
  });

  it.each(['lapsed', 'cancelled', 'returned', 'reversed'] as const)(
    'is not read by the buyer of a deal that is %s',
    async (state) => {
      const deal = await buildDeal({ state: 'funded' });
      const asBuyer = await app.signIn(deal.buyer);
      const url = await documentOf(deal.lot.id);
      const seen = async () =>
        (await asBuyer.get(`/api/v1/deals/${deal.code}`).expect(200)).body.certificateUrl;
      expect(await seen()).toBe(url);
      await Deal.update({ state, liveLotId: null }, { where: { id: deal.id } });
      expect(await seen()).toBeNull();
      await asBuyer.get(url).expect(403);
      await (await app.signIn(deal.seller)).get(url).expect(200);
    },
  );
});

describe('a file’s name', () => {
  it.each([
    ['../../etc/passwd', 'passwd'],
    ['C:\\scans\\report.pdf', 'report.pdf'],
    ['re\u202eport\u0000.pdf', 're port .pdf'],
    ['', 'file'],
  ])('%j is kept as %j', (given, kept) => {
    expect(tidyFileName(given)).toBe(kept);
  });
});
