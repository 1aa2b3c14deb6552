import { beforeAll, describe, expect, it } from 'vitest';
import { lotAnswer, type LotAnswer, type LotDraft, lotDraft, myLotsAnswer } from '#shared/schemas/lots.ts';
import { databaseNow, withTransaction } from '#server/database/transaction.ts';
import { openLot } from '#server/features/lots/open-lot.ts';
import { uploadPhoto } from '#server/features/photos/upload-photo.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import { LotEvent } from '#server/models/lot-event.ts';
import { Member } from '#server/models/member.ts';
import { buildLot, buildRates, completeDraft, pdfBytes } from '#tests/factories/build-lot.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { photoBytes } from '#tests/helpers/test-photo.ts';
import { startTestApp, type TestApp, type Visitor } from '#tests/helpers/test-app.ts';

let app: TestApp;
let seller: BuiltMember;
let asSeller: Visitor;
let asStranger: Visitor;
let asDesk: Visitor;
let passerBy: Visitor;

beforeAll(async () => {
  app = await startTestApp();
  await buildRates();
  seller = await buildMember({ canSell: true });
  asSeller = await app.signIn(seller);
  asStranger = await app.signIn(await buildMember({ canSell: true }));
  asDesk = await app.signIn(await buildMember({ role: 'desk' }));
  passerBy = await app.visitor();
});

const mine = {
  get sellerId() {
    return seller.id;
  },
};

async function newDraft(visitor = asSeller): Promise<LotAnswer> {
  const { body } = await visitor.post('/api/v1/lots').expect(201);
  return lotAnswer.parse(body);
}

async function upload(visitor: Visitor, code: string, content = pdfBytes(), name = 'report.pdf') {
  // A post of the visitor carries the token; the form replaces its empty body.
  const { csrfToken } = await visitor.refreshToken();
  return visitor.agent
    .post(`/api/v1/lots/${code}/certificate`)
    .set('X-CSRF-Token', csrfToken)
    .attach('file', content, name);
}

async function readyDraft(change: (draft: LotDraft) => void = () => undefined, content = pdfBytes()) {
  const { code, version } = await newDraft();
  const { body } = await upload(asSeller, code, content);
  const draft = completeDraft(await databaseNow());
  draft.certificate.fileId = body.fileId as string;
  change(draft);
  await asSeller.put(`/api/v1/lots/${code}/draft`, { draft, version }).expect(200);
  return { code, draft };
}

describe('drafting', () => {
  it('makes a blank draft that only its seller sees', async () => {
    const lot = await newDraft();
    expect(lot).toMatchObject({ state: 'draft', version: 0, isMine: true, gross: null, sheet: null });
    expect(lot.draft).toEqual(lotDraft.parse({}));
    expect(lot.can).toMatchObject({ edit: true, submit: true, withdraw: false, buy: false });
    for (const visitor of [asStranger, asDesk, passerBy]) {
      await visitor.get(`/api/v1/lots/${lot.code}`).expect(404);
    }
  });

  it('refuses a document that another seller has uploaded, or nobody, and keeps the draft as it was', async () => {
    const foreign = await buildLot({ state: 'submitted' });
    const { code, version } = await newDraft();
    for (const fileId of [foreign.draft.certificate.fileId!, '00000000-0000-7000-8000-00000000dead']) {
      const draft = lotDraft.parse({ title: 'Taken over', certificate: { fileId } });
      const { body } = await asSeller.put(`/api/v1/lots/${code}/draft`, { draft, version }).expect(422);
      expect(body.errors).toMatchObject([{ pointer: '/draft/certificate/fileId', code: 'file-unknown' }]);
    }
    expect((await asSeller.get(`/api/v1/lots/${code}`)).body).toMatchObject({
      version,
      draft: { title: '' },
    });
  });

  it('keeps what is typed, right or wrong, and shows the sheet as soon as it can', async () => {
    const { code } = await newDraft();
    const draft = lotDraft.parse({ title: 'Go', gross: { value: '1,2,3', unit: 'stone' } });
    const { body } = await asSeller.put(`/api/v1/lots/${code}/draft`, { draft, version: 0 }).expect(200);
    expect(body).toMatchObject({ version: 1, draft, sheet: null });
    const better = completeDraft(await databaseNow());
    const second = await asSeller
      .put(`/api/v1/lots/${code}/draft`, { draft: better, version: 1 })
      .expect(200);
    expect(second.body.sheet.total).toBe('1925.00');
    expect(second.body.sellerSheet.total).toBe('1849.00');
  });

  it('refuses a save of an older version and keeps the newer one', async () => {
    const { code } = await newDraft();
    const first = lotDraft.parse({ title: 'First window' });
    await asSeller.put(`/api/v1/lots/${code}/draft`, { draft: first, version: 0 }).expect(200);
    const late = { draft: lotDraft.parse({ title: 'Second window' }), version: 0 };
    const { body } = await asSeller.put(`/api/v1/lots/${code}/draft`, late).expect(412);
    expect(body.code).toBe('version-conflict');
    expect((await asSeller.get(`/api/v1/lots/${code}`)).body.draft.title).toBe('First window');
  });

  it('lets one of two saves at once through', async () => {
    const { code } = await newDraft();
    const save = (title: string) =>
      asSeller.put(`/api/v1/lots/${code}/draft`, { draft: lotDraft.parse({ title }), version: 0 });
    const answers = await Promise.all([save('One window'), save('Other window')]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
  });

  it('is not for visitors, laboratories or members who are suspended', async () => {
    expect((await passerBy.post('/api/v1/lots').expect(401)).body.code).toBe('sign-in-required');
    const lab = await app.signIn(await buildMember({ role: 'lab' }));
    await lab.post('/api/v1/lots').expect(403);
    const member = await buildMember({ canSell: true });
    const suspended = await app.signIn(member);
    await Member.update({ suspendedAt: new Date() }, { where: { id: member.id } });
    expect((await suspended.post('/api/v1/lots').expect(403)).body.code).toBe('member-suspended');
  });

  it('answers 404 for another’s draft and 403 for another’s open lot', async () => {
    const { code } = await newDraft();
    const save = { draft: lotDraft.parse({}), version: 0 };
    await asStranger.put(`/api/v1/lots/${code}/draft`, save).expect(404);
    const open = await buildLot({ state: 'open' });
    await asStranger.put(`/api/v1/lots/${open.code}/draft`, save).expect(403);
    await asStranger.post(`/api/v1/lots/${open.code}/pause`).expect(403);
  });

  it('copies an own lot without its confirmations, and no other’s', async () => {
    const source = await buildLot({ ...mine, state: 'closed' });
    const { body } = await asSeller.post('/api/v1/lots', { copyOf: source.code }).expect(201);
    expect(body.draft).toMatchObject({ title: source.draft.title, confirmsTitle: false, closesOn: '' });
    const open = await buildLot({ state: 'open' });
    await asSeller.post('/api/v1/lots', { copyOf: open.code }).expect(403);
    const closed = await buildLot({ state: 'closed' });
    await asSeller.post('/api/v1/lots', { copyOf: closed.code }).expect(404);
    const { code } = await newDraft();
    await asSeller.post('/api/v1/lots', { copyOf: code }).expect(409);
  });

  it('takes the photos of the lot along, as copies of their own', async () => {
    const source = await readyDraft();
    const { id } = await Lot.findOne({ where: { code: source.code }, rejectOnEmpty: true });
    for (const name of ['first.jpg', 'second.jpg']) {
      const photo = { name, content: await photoBytes() };
      await uploadPhoto(id, photo, seller.actor, { caption: name, isDrawing: name === 'second.jpg' });
    }
    await asSeller.post(`/api/v1/lots/${source.code}/submit`).expect(200);
    const { body } = await asSeller.post('/api/v1/lots', { copyOf: source.code }).expect(201);
    const { photos } = body as LotAnswer;
    expect(photos.map(({ caption, isDrawing }) => [caption, isDrawing])).toEqual([
      ['first.jpg', false],
      ['second.jpg', true],
    ]);
    const originals = ((await asSeller.get(`/api/v1/lots/${source.code}`)).body as LotAnswer).photos;
    const [copy, original] = await Promise.all([
      asSeller.get(photos[0]!.medium).expect(200),
      asSeller.get(originals[0]!.medium).expect(200),
    ]);
    expect((copy.body as Buffer).equals(original.body as Buffer)).toBe(true);
    await asSeller.delete(`/api/v1/lots/${body.code}/draft`).expect(204);
    await asSeller.get(originals[0]!.medium).expect(200);
    await asSeller.get(photos[0]!.medium).expect(404);
  });

  it('deletes a draft that the desk never saw, and no other', async () => {
    const { code } = await readyDraft();
    await asSeller.delete(`/api/v1/lots/${code}/draft`).expect(204);
    await asSeller.get(`/api/v1/lots/${code}`).expect(404);
    const returned = await buildLot({ ...mine, state: 'returned' });
    await asSeller.post(`/api/v1/lots/${returned.code}/redraft`).expect(200);
    const { body } = await asSeller.delete(`/api/v1/lots/${returned.code}/draft`).expect(409);
    expect(body.code).toBe('illegal-transition');
  });
});

describe('submitting', () => {
  it('writes assay, certificate, event and state, and keeps the digits typed', async () => {
    const { code } = await readyDraft((draft) => (draft.gross.value = '31,20'));
    const { body } = await asSeller.post(`/api/v1/lots/${code}/submit`).expect(200);
    const lot = lotAnswer.parse(body);
    expect(lot).toMatchObject({
      state: 'submitted',
      gross: { value: '31.20', unit: 'g', grams: '31.2' },
      contents: [{ element: 'Au', finenessPermille: '995.2', uncertaintyPermille: '0.5', isPaidFor: true }],
      price: { currency: 'USD', amount: '1900.00' },
      certificate: { state: 'submitted', laboratoryName: 'Tarn Assay House' },
      history: [{ act: 'submitted', who: 'Seller' }],
      draft: null,
    });
    expect(lot.certificate?.documentUrl).toMatch(/^\/api\/v1\/certificates\/.+\/document$/);
    expect(lot.nets).toMatchObject([
      { method: 'card', commission: { amount: '76.00' }, net: { amount: '1849.00' } },
      { method: 'bank_debit', commission: { amount: '28.50' }, net: { amount: '1896.50' } },
    ]);
    const row = await Lot.findOne({ where: { code }, rejectOnEmpty: true });
    expect(row).toMatchObject({ assayVersion: 1, grossGrams: '31.200000000000000', priceMinor: 190_000n });
    expect(await LotAssay.count({ where: { lotId: row.id } })).toBe(1);
    expect(await Certificate.count({ where: { lotId: row.id } })).toBe(1);
  });

  it('tells all that is missing at once, at its fields, and changes nothing', async () => {
    const { code } = await newDraft();
    const { body } = await asSeller.post(`/api/v1/lots/${code}/submit`).expect(422);
    expect(body.code).toBe('lot-not-complete');
    const pointers = (body.errors as { pointer: string }[]).map(({ pointer }) => pointer);
    expect(pointers).toEqual(
      expect.arrayContaining([
        '/form',
        '/title',
        '/gross/value',
        '/contents',
        '/price',
        '/certificate/fileId',
      ]),
    );
    expect((await asSeller.get(`/api/v1/lots/${code}`)).body.state).toBe('draft');
  });

  it('refuses a document that is another member’s, should a draft name one', async () => {
    const other = await buildLot({ state: 'draft' });
    const { code, draft } = await readyDraft();
    draft.certificate.fileId = other.draft.certificate.fileId;
    await Lot.update({ draft }, { where: { code } });
    const { body } = await asSeller.post(`/api/v1/lots/${code}/submit`).expect(422);
    expect(body.errors).toMatchObject([{ pointer: '/certificate/fileId', code: 'file-missing' }]);
  });

  it('asks for payout onboarding first', async () => {
    const visitor = await app.signIn(await buildMember());
    const { code } = await newDraft(visitor);
    const { body } = await visitor.post(`/api/v1/lots/${code}/submit`).expect(409);
    expect(body.code).toBe('payout-onboarding-required');
  });

  it('refuses what is not a draft', async () => {
    const lot = await buildLot({ ...mine, state: 'submitted' });
    expect((await asSeller.post(`/api/v1/lots/${lot.code}/submit`).expect(409)).body.code).toBe(
      'illegal-transition',
    );
  });

  it('refuses the report of another live lot, however its number is written', async () => {
    const live = await buildLot({ state: 'submitted' });
    const { number } = live.draft.certificate;
    const { code } = await readyDraft((draft) => {
      draft.certificate.number = ` ${number.toLowerCase().replace('-', ' ')}`;
      draft.certificate.laboratoryName = 'TARN  ASSAY-HOUSE';
    });
    const { body } = await asSeller.post(`/api/v1/lots/${code}/submit`).expect(409);
    expect(body).toMatchObject({
      code: 'certificate-in-use',
      errors: [{ pointer: '/certificate/number', code: 'certificate-in-use' }],
    });
    expect((await asSeller.get(`/api/v1/lots/${code}`)).body).toMatchObject({
      state: 'draft',
      certificate: null,
    });
  });

  it('refuses the same document under another number', async () => {
    const bytes = pdfBytes();
    const first = await readyDraft(undefined, bytes);
    const second = await readyDraft(undefined, bytes);
    await asSeller.post(`/api/v1/lots/${first.code}/submit`).expect(200);
    const { body } = await asSeller.post(`/api/v1/lots/${second.code}/submit`).expect(409);
    expect(body.errors).toMatchObject([{ pointer: '/certificate/fileId', code: 'certificate-in-use' }]);
  });

  it('lets one of two lots with one certificate through at once', async () => {
    const number = `RACE-${Date.now()}`;
    const named = (draft: LotDraft) => void (draft.certificate.number = number);
    const [first, second] = [await readyDraft(named), await readyDraft(named)];
    const answers = await Promise.all(
      [first, second].map(({ code }) => asSeller.post(`/api/v1/lots/${code}/submit`)),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(await Certificate.count({ where: { number } })).toBe(1);
  });

  it('frees the certificate when its lot is withdrawn', async () => {
    const live = await buildLot({ state: 'withdrawn' });
    const { code } = await readyDraft((draft) => {
      draft.certificate.number = live.draft.certificate.number;
    });
    await asSeller.post(`/api/v1/lots/${code}/submit`).expect(200);
  });

  it('writes a new version after a return, and leaves the old one', async () => {
    const lot = await buildLot({ ...mine, state: 'returned' });
    const redrafted = await asSeller.post(`/api/v1/lots/${lot.code}/redraft`).expect(200);
    expect(redrafted.body).toMatchObject({ state: 'draft', draft: { title: lot.draft.title } });
    const draft = {
      ...lot.draft,
      contents: [{ ...lot.draft.contents[0]!, fineness: { value: '990', unit: 'permille' } }],
    };
    const version = redrafted.body.version as number;
    await asSeller.put(`/api/v1/lots/${lot.code}/draft`, { draft, version }).expect(200);
    await asSeller.post(`/api/v1/lots/${lot.code}/submit`).expect(200);
    const versions = await LotAssay.findAll({ where: { lotId: lot.id }, order: [['assayVersion', 'ASC']] });
    expect(versions.map((row) => [row.assayVersion, row.finenessValue])).toEqual([
      [1, '995.2'],
      [2, '990'],
    ]);
  });
});

async function find(lot: { id: string }) {
  return Lot.findByPk(lot.id, { rejectOnEmpty: true });
}

describe('opening', () => {
  it('opens a certified lot with dates and ranking keys, for anyone to see', async () => {
    const lot = await buildLot({ ...mine, state: 'open' });
    const { body } = await passerBy.get(`/api/v1/lots/${lot.code}`).expect(200);
    const seen = lotAnswer.parse(body);
    expect(seen).toMatchObject({
      state: 'open',
      isMine: false,
      evidenceGrade: 'certified',
      draft: null,
      sellerSheet: null,
      nets: [],
      dealCode: null,
    });
    expect(seen.certificate?.documentUrl).toBeNull();
    expect(seen.history.map(({ act }) => act)).toEqual(['opened']);
    expect(JSON.stringify(body)).not.toContain(seller.email);
    const row = await find(lot);
    // 31.20 g × 995.2 ‰ = 31.050240 g; 1900.00 ÷ 31.050240, computed apart
    expect(row).toMatchObject({
      mainMetal: 'Au',
      mainFineGrams: '31.050240000000000',
      rankPrice: '61.19115343',
    });
    const days = (row.closesAt!.getTime() - row.openedAt!.getTime()) / 86_400_000;
    expect(days).toBe(90);
  });

  it('leaves any other grade submitted, marked examined', async () => {
    const lot = await buildLot({ state: 'submitted' });
    await withTransaction({ lots: [lot.id] }, async (unit) => {
      const row = await Lot.findByPk(lot.id, { transaction: unit.tx, rejectOnEmpty: true });
      await openLot({ lot: row, grade: 'examined' }, unit, { id: seller.id });
    });
    expect(await find(lot)).toMatchObject({ state: 'submitted', evidenceGrade: 'examined', rankPrice: null });
    expect(await LotEvent.count({ where: { lotId: lot.id, act: 'examined' } })).toBe(1);
  });

  it('refuses to open what is no longer submitted', async () => {
    const lot = await buildLot({ state: 'withdrawn' });
    const row = await find(lot);
    const opening = withTransaction({ lots: [lot.id] }, (unit) =>
      openLot({ lot: row, grade: 'certified' }, unit, { id: seller.id }),
    );
    await expect(opening).rejects.toMatchObject({ code: 'illegal-transition' });
  });
});

describe('while a lot is open', () => {
  it('changes the price with its ranking key and tells both sums', async () => {
    const lot = await buildLot({ ...mine, state: 'open' });
    const { body } = await asSeller.post(`/api/v1/lots/${lot.code}/price`, { price: '1950.00' }).expect(200);
    expect(body.price.amount).toBe('1950.00');
    expect(body.history.at(-1)).toMatchObject({ act: 'price-changed', note: 'US$ 1900.00 → US$ 1950.00' });
    expect((await find(lot)).rankPrice).toBe('62.80144695');
  });

  it.each([
    ['19.99', 'price-too-low'],
    ['990000.01', 'price-too-high'],
    ['1900.001', 'too-many-decimals'],
    ['1900,50', 'invalid_format'],
    ['-20.00', 'price-too-low'],
  ])('refuses a price of %s at its field', async (price, code) => {
    const lot = await buildLot({ ...mine, state: 'open' });
    const { body } = await asSeller.post(`/api/v1/lots/${lot.code}/price`, { price }).expect(422);
    expect(body.errors).toMatchObject([{ pointer: '/price', code }]);
  });

  it.each(['paused', 'submitted', 'closed'] as const)('refuses a price while %s', async (state) => {
    const lot = await buildLot({ ...mine, state });
    const { body } = await asSeller.post(`/api/v1/lots/${lot.code}/price`, { price: '1950.00' }).expect(409);
    expect(body.code).toBe('illegal-transition');
  });

  it('refuses a price while reserved', async () => {
    const lot = await buildLot({ ...mine, state: 'open' });
    await Lot.update({ state: 'reserved' }, { where: { id: lot.id } });
    await asSeller.post(`/api/v1/lots/${lot.code}/price`, { price: '1950.00' }).expect(409);
    await asSeller.post(`/api/v1/lots/${lot.code}/withdraw`, { reason: 'Changed my mind' }).expect(409);
    expect((await find(lot)).priceMinor).toBe(190_000n);
  });

  it('pauses and reopens for the seller alone', async () => {
    const lot = await buildLot({ ...mine, state: 'open' });
    await asSeller.post(`/api/v1/lots/${lot.code}/pause`).expect(200);
    await passerBy.get(`/api/v1/lots/${lot.code}`).expect(404);
    await asDesk.post(`/api/v1/lots/${lot.code}/reopen`).expect(403);
    const { body } = await asSeller.post(`/api/v1/lots/${lot.code}/reopen`).expect(200);
    expect(body.state).toBe('open');
    await asSeller.post(`/api/v1/lots/${lot.code}/reopen`).expect(409);
  });

  it('does not reopen after the closing day', async () => {
    const lot = await buildLot({ ...mine, state: 'paused' });
    await Lot.update({ closesAt: new Date(Date.now() - 1000) }, { where: { id: lot.id } });
    const { body } = await asSeller.post(`/api/v1/lots/${lot.code}/reopen`).expect(409);
    expect(body.code).toBe('deadline-passed');
  });

  it('withdraws for good, with a reason', async () => {
    const lot = await buildLot({ ...mine, state: 'open' });
    await asSeller.post(`/api/v1/lots/${lot.code}/withdraw`, { reason: '' }).expect(422);
    const answer = await asSeller.post(`/api/v1/lots/${lot.code}/withdraw`, { reason: 'Kept it after all' });
    expect(answer.body).toMatchObject({ state: 'withdrawn', stateReason: 'Kept it after all' });
    await asSeller.post(`/api/v1/lots/${lot.code}/reopen`).expect(409);
  });

  it('takes a waiting case out of the queue when its lot is withdrawn', async () => {
    const lot = await buildLot({ ...mine, state: 'submitted' });
    await asSeller.post(`/api/v1/lots/${lot.code}/withdraw`, { reason: 'Kept it after all' }).expect(200);
    expect(await Certificate.findOne({ where: { lotId: lot.id } })).toMatchObject({
      state: 'superseded',
      liveKey: null,
    });
  });
});

describe('lists and rates', () => {
  it('shows a member’s own lots in every state', async () => {
    const member = await buildMember({ canSell: true });
    const lots = [
      await buildLot({ sellerId: member.id, state: 'draft' }),
      await buildLot({ sellerId: member.id, state: 'open' }),
    ];
    const visitor = await app.signIn(member);
    const { body } = await visitor.get('/api/v1/me/lots').expect(200);
    const answer = myLotsAnswer.parse(body);
    expect(answer.lots.map(({ code }) => code).sort()).toEqual(lots.map(({ code }) => code).sort());
    await passerBy.get('/api/v1/me/lots').expect(401);
  });

  it('tells the commission of each payment method to anyone', async () => {
    const { body } = await passerBy.get('/api/v1/fee-schedule').expect(200);
    expect(body.rates).toMatchObject([
      { method: 'card', percent: '4', minimum: { amount: '2.00' } },
      { method: 'bank_debit', percent: '1.5', minimum: { amount: '2.00' } },
    ]);
  });

  it('answers 404 for a code that is none', async () => {
    await passerBy.get('/api/v1/lots/S-000000').expect(404);
    await passerBy.get('/api/v1/lots/nonsense').expect(404);
  });
});
