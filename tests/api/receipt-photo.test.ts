import { randomUUID } from 'node:crypto';
import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { dealAnswer, receiptPhotoAnswer } from '#shared/schemas/deals.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import { buildDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { pdfBytes } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { photoBytes } from '#tests/helpers/test-photo.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const mass = { value: '31.20', unit: 'g' };
const pathOf = ({ code }: BuiltDeal, rest: string) => `/api/v1/deals/${code}/${rest}`;

async function upload(visitor: Visitor, deal: BuiltDeal, content: Buffer, name = 'balance.jpg') {
  const { csrfToken } = await visitor.refreshToken();
  return visitor.agent
    .post(pathOf(deal, 'receipt-photo'))
    .set('X-CSRF-Token', csrfToken)
    .attach('file', content, name);
}

describe('the photo of the weighing', () => {
  it('is taken before the mass, recorded with it, and seen by both sides and the desk alone', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const buyer = await app.signIn(deal.buyer);
    const sent = await upload(buyer, deal, await photoBytes({ width: 1200, height: 900 }));
    expect(sent.status).toBe(201);
    const { fileId } = receiptPhotoAnswer.parse(sent.body);
    expect(await StoredFile.findByPk(fileId)).toMatchObject({
      kind: 'receipt_photo',
      ownerId: deal.buyer.id,
      originalName: 'balance.jpg',
    });
    await buyer.get(pathOf(deal, 'receipt-photo/960')).expect(404);
    const { body } = await buyer.post(pathOf(deal, 'receipt'), { mass, photoFileId: fileId }).expect(200);
    const { receipt } = dealAnswer.parse(body);
    expect(receipt).toMatchObject({
      photoUrl: pathOf(deal, 'receipt-photo/2000'),
      photoThumb: pathOf(deal, 'receipt-photo/240'),
    });
    const desk = await app.signIn(await buildMember({ role: 'desk' }));
    for (const visitor of [buyer, await app.signIn(deal.seller), desk]) {
      const answer = await visitor.agent.get(receipt!.photoThumb!).responseType('blob').expect(200);
      expect(answer.headers['cache-control']).toBe('private, no-store');
      const found = await sharp(answer.body as Buffer).metadata();
      expect([found.format, found.width, found.exif]).toEqual(['webp', 240, undefined]);
    }
    await (await app.signIn(await buildMember())).get(receipt!.photoUrl!).expect(404);
    await (await app.visitor()).get(receipt!.photoUrl!).expect(401);
    await buyer.get(pathOf(deal, 'receipt-photo/999')).expect(404);
  });

  it('may be left out', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    const { body } = await (await app.signIn(deal.seller)).get(`/api/v1/deals/${deal.code}`).expect(200);
    expect(body.receipt).toMatchObject({ photoUrl: null, photoThumb: null });
  });

  it.each([
    ['a PDF named .jpg', async () => pdfBytes(), 415, 'photo-not-an-image'],
    ['30 MB', async () => Buffer.alloc(30 * 1024 * 1024, 1), 413, 'photo-too-large'],
    ['half a JPEG', async () => (await photoBytes()).subarray(0, 700), 422, 'photo-broken'],
  ] as const)('is refused where it is %s, and leaves nothing', async (_, content, status, code) => {
    const deal = await buildDeal({ state: 'delivered' });
    const answer = await upload(await app.signIn(deal.buyer), deal, await content());
    expect([answer.status, answer.body.code]).toEqual([status, code]);
    expect(await StoredFile.count({ where: { ownerId: deal.buyer.id } })).toBe(0);
  });

  it('is the buyer’s, after the delivery and before the mass is recorded', async () => {
    const content = await photoBytes();
    const deal = await buildDeal({ state: 'delivered' });
    const codeOf = async (visitor: Visitor, of: BuiltDeal) => (await upload(visitor, of, content)).body.code;
    expect(await codeOf(await app.signIn(deal.seller), deal)).toBe('forbidden');
    expect(await codeOf(await app.signIn(await buildMember()), deal)).toBe('not-found');
    const early = await buildDeal({ state: 'shipped' });
    expect(await codeOf(await app.signIn(early.buyer), early)).toBe('illegal-transition');
    const late = await buildDeal({ state: 'delivered', hasReceipt: true });
    expect(await codeOf(await app.signIn(late.buyer), late)).toBe('illegal-transition');
  });

  it('counts once, and no other file of the buyer’s passes for one', async () => {
    const first = await buildDeal({ state: 'delivered' });
    const second = await buildDeal({ state: 'delivered', buyer: first.buyer });
    const buyer = await app.signIn(first.buyer);
    const { fileId } = receiptPhotoAnswer.parse((await upload(buyer, first, await photoBytes())).body);
    await buyer.post(pathOf(first, 'receipt'), { mass, photoFileId: fileId }).expect(200);
    const other = await StoredFile.findByPk(fileId, { rejectOnEmpty: true, raw: true });
    const document = await StoredFile.create({
      ...other,
      id: randomUUID(),
      kind: 'certificate',
      storageKey: randomUUID(),
    });
    for (const photoFileId of [fileId, document.id]) {
      const answer = await buyer.post(pathOf(second, 'receipt'), { mass, photoFileId }).expect(422);
      expect(answer.body.errors).toMatchObject([{ pointer: '/photoFileId', code: 'photo-unknown' }]);
    }
  });
});
