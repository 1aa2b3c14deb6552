import { beforeAll, describe, expect, it } from 'vitest';
import type { CaseAnswer, QueueAnswer, QueueRow } from '#shared/schemas/desk.ts';
import { caseAnswer, queueAnswer } from '#shared/schemas/desk.ts';
import { newId } from '#server/database/ids.ts';
import { Certificate } from '#server/models/certificate.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Lot } from '#server/models/lot.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import { buildDeskCase, buildLaboratory, type DeskCase } from '#tests/factories/build-desk-case.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const BASE = '/api/v1/desk/certificates';
let desk: Visitor;
let colleague: Visitor;
let admin: Visitor;
let deskMember: BuiltMember;

beforeAll(async () => {
  deskMember = await buildMember({ role: 'desk', canSell: true });
  desk = await app.signIn(deskMember);
  colleague = await app.signIn(await buildMember({ role: 'desk' }));
  admin = await app.signIn(await buildMember({ role: 'admin' }));
});

const claim = (id: string, who = desk) => who.post(`${BASE}/${id}/claim`);

async function claimed(
  wishes: Parameters<typeof buildDeskCase>[0] = {},
): Promise<DeskCase & { view: CaseAnswer }> {
  const made = await buildDeskCase(wishes);
  const answer = await claim(made.id).expect(200);
  return { ...made, view: answer.body as CaseAnswer };
}

function confirmation(made: { view: CaseAnswer; laboratory: { id: string } | null }) {
  return {
    version: made.view.version,
    laboratoryId: made.laboratory!.id,
    confirmedHow: 'by telephone, number from the register',
    confirmedWith: 'P. Orsino',
    confirmedOn: '2026-11-30',
  };
}

async function mailsTo(memberId: string): Promise<string[]> {
  const mails = await OutboxMail.findAll({ where: { memberId } });
  return mails.map((mail) => mail.mail);
}

async function actsOn(subjectId: string): Promise<string[]> {
  const entries = await AuditEntry.findAll({ where: { subjectId }, order: [['at', 'ASC']] });
  return entries.map((entry) => entry.act);
}

async function addPhoto(lotId: string, ownerId: string, sha256: string): Promise<void> {
  const file = await StoredFile.create({
    id: newId(),
    ownerId,
    kind: 'photo',
    sha256,
    mediaType: 'image/webp',
    byteCount: 10,
    width: 20,
    height: 10,
    originalName: 'button.jpg',
    storageKey: `photos/test/${newId()}`,
  });
  await LotPhoto.create({ id: newId(), lotId, fileId: file.id, position: 0 });
}

describe('the queue', () => {
  it('lists what waits, oldest first, and what was decided apart', async () => {
    const first = await buildDeskCase();
    const second = await buildDeskCase();
    const returned = await claimed();
    await desk
      .post(`${BASE}/${returned.id}/return`, {
        version: returned.view.version,
        reason: 'The report is cut off.',
      })
      .expect(200);
    const { body } = await desk.get(BASE).expect(200);
    const queue: QueueAnswer = queueAnswer.parse(body);
    const ids = queue.waiting.map((row) => row.id);
    expect(ids.indexOf(first.id)).toBeLessThan(ids.indexOf(second.id));
    expect(ids).toContain(first.id);
    expect(ids).not.toContain(returned.id);
    expect(queue.decided[0]).toMatchObject({ id: returned.id, state: 'returned', can: { claim: false } });
  });

  it('shows an own case as one that can be neither opened nor claimed', async () => {
    const own = await buildDeskCase({ seller: deskMember });
    const { body } = await desk.get(BASE).expect(200);
    const row = (body as QueueAnswer).waiting.find(({ id }) => id === own.id) as QueueRow;
    expect(row.can).toEqual({ claim: false, open: false });
    for (const request of [desk.get(`${BASE}/${own.id}`), claim(own.id)]) {
      const answer = await request;
      expect(answer.status).toBe(403);
      expect(answer.body.code).toBe('own-case');
    }
    await claim(own.id, colleague).expect(200);
  });

  it('is closed to members and laboratories', async () => {
    const { id } = await buildDeskCase();
    for (const role of ['member', 'lab'] as const) {
      const visitor = await app.signIn(await buildMember({ role }));
      await visitor.get(BASE).expect(403);
      await visitor.get(`${BASE}/${id}`).expect(403);
      for (const act of ['claim', 'release', 'verify', 'examine', 'return'])
        await visitor.post(`${BASE}/${id}/${act}`).expect(403);
    }
    expect((await Certificate.findByPk(id))!.state).toBe('submitted');
  });
});

describe('a claim', () => {
  it('is given to exactly one of two who ask at once', async () => {
    for (let round = 0; round < 4; round += 1) {
      const { id } = await buildDeskCase();
      const answers = await Promise.all([claim(id, desk), claim(id, colleague)]);
      expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409]);
      expect(answers.find((answer) => answer.status === 409)!.body.code).toBe('certificate-claimed');
      expect(await actsOn(id)).toEqual(['claim-certificate']);
    }
  });

  it('asked for again by its holder changes nothing', async () => {
    const { id, view } = await claimed();
    const again = await claim(id).expect(200);
    expect(again.body.version).toBe(view.version);
    expect(view).toMatchObject({ state: 'claimed', claimedBy: deskMember.displayName });
    expect(view.can).toMatchObject({
      claim: false,
      release: true,
      verify: true,
      examine: true,
      return: true,
    });
  });

  it('is given back by its holder or an admin, not by a colleague', async () => {
    const { id } = await claimed();
    const refused = await colleague.post(`${BASE}/${id}/release`).expect(409);
    expect(refused.body.code).toBe('certificate-claimed');
    const free = await desk.post(`${BASE}/${id}/release`).expect(200);
    expect(free.body).toMatchObject({ state: 'submitted', claimedBy: null, can: { claim: true } });
    const twice = await desk.post(`${BASE}/${id}/release`).expect(409);
    expect(twice.body.code).toBe('certificate-not-claimed');
    await claim(id, colleague).expect(200);
    await admin.post(`${BASE}/${id}/release`).expect(200);
    expect(await actsOn(id)).toEqual([
      'claim-certificate',
      'release-certificate',
      'claim-certificate',
      'release-certificate',
    ]);
  });

  it('on a certificate that is not there finds nothing', async () => {
    await claim('00000000-0000-7000-8000-00000000dead').expect(404);
    await claim('not-an-id').expect(404);
  });
});

describe('the case', () => {
  it('shows report and lot side by side, and proposes the grade', async () => {
    const made = await buildDeskCase({ stated: '995.2', reported: '995.2' });
    const { body } = await desk.get(`${BASE}/${made.id}`).expect(200);
    const view = caseAnswer.parse(body);
    expect(view.proposedGrade).toBe('certified');
    expect(view.gaps).toEqual([]);
    expect(view.flags).toEqual([]);
    expect(view.comparison.filter((row) => row.differs)).toEqual([]);
    expect(view.document).toMatchObject({ mediaType: 'application/pdf', name: 'report.pdf' });
    expect(view.report.itemMass).toEqual({ value: '31.20', unit: 'g' });
    expect(view.lot.history.map((event) => event.act)).toContain('submitted');
    expect(view.can.verify).toBe(false);
  });

  it('marks what differs and says by how much', async () => {
    const made = await buildDeskCase({
      stated: '990',
      reported: '995.2',
      itemMass: '31.52',
      itemDescription: 'Bar, gold',
    });
    const { body } = await desk.get(`${BASE}/${made.id}`).expect(200);
    const marked = (body as CaseAnswer).comparison.filter((row) => row.differs);
    expect(marked.map((row) => row.label)).toEqual(['Mass', 'Form', 'Gold: fineness']);
    expect(marked[0]!.note).toContain('0.32 g');
    expect(marked[2]!.note).toBe('The lot states 5.2 ‰ less than the report.');
    expect(body.proposedGrade).toBe('examined');
    expect(body.gaps).toEqual(['Neither the mass nor the mark on the report is the lot’s.']);
  });

  it('does not take 31.30 g for 31.20 g, whatever zeros the database drops', async () => {
    const made = await buildDeskCase({ gross: '31.20', itemMass: '31.30' });
    const { body } = await desk.get(`${BASE}/${made.id}`).expect(200);
    expect(body.comparison[0]).toMatchObject({ label: 'Mass', differs: true });
  });

  it('flags a photo that stands with another lot', async () => {
    const [first, second] = [await buildDeskCase(), await buildDeskCase()];
    for (const { lotId, sellerId } of [first, second]) await addPhoto(lotId, sellerId, 'cd'.repeat(32));
    const { body } = await desk.get(`${BASE}/${second.id}`).expect(200);
    expect(caseAnswer.parse(body).flags).toMatchObject([{ code: 'photo-seen-before', lotCode: first.code }]);
    expect(body.lot.photos).toMatchObject([
      { thumb: expect.stringMatching(/^\/api\/v1\/photos\/[0-9a-f-]+\/240$/) },
    ]);
  });

  it('flags number and file seen before, and only on another lot', async () => {
    const laboratory = await buildLaboratory();
    const hash = 'ab'.repeat(32);
    const old = await claimed({ laboratory, number: 'HV 1207', documentHash: hash });
    const reason = 'The last page of the report is missing.';
    await desk.post(`${BASE}/${old.id}/return`, { version: old.view.version, reason }).expect(200);
    const next = await buildDeskCase({ laboratory, number: 'hv1207', documentHash: hash });
    const { body } = await desk.get(`${BASE}/${next.id}`).expect(200);
    const flags = (body as CaseAnswer).flags.map(({ code, lotCode }) => [code, lotCode]);
    expect(flags).toEqual([
      ['number-seen-before', old.code],
      ['file-seen-before', old.code],
    ]);
    const elsewhere = await buildDeskCase({ number: 'HV 1207' });
    const other = await desk.get(`${BASE}/${elsewhere.id}`).expect(200);
    expect(other.body.flags).toEqual([]);
    const queue = (await desk.get(BASE)).body as QueueAnswer;
    expect(queue.waiting.find((row) => row.id === next.id)!.flags).toBe(2);
  });

  it('flags laboratory, accreditation, sampling, method and range', async () => {
    const expired = await buildLaboratory({ validUntil: '2026-01-31' });
    const codes = async (wishes: Parameters<typeof buildDeskCase>[0]) => {
      const { id } = await buildDeskCase(wishes);
      return ((await desk.get(`${BASE}/${id}`)).body as CaseAnswer).flags.map((flag) => flag.code);
    };
    expect(await codes({ laboratory: null })).toEqual(['laboratory-unknown']);
    expect(await codes({ laboratory: await buildLaboratory({ isActive: false }) })).toEqual([
      'laboratory-unknown',
    ]);
    expect(await codes({ laboratory: expired })).toEqual(['accreditation-expired']);
    expect(await codes({ sampling: 'customer' })).toEqual(['not-sampled-by-laboratory']);
    expect(await codes({ sampling: 'not_stated' })).toEqual(['not-sampled-by-laboratory']);
    expect(await codes({ method: 'xrf' })).toEqual(['method-surface-only']);
    expect(await codes({ stated: '999.9' })).toEqual(['outside-method-range']);
  });
});

describe('verifying', () => {
  it('certifies and opens the lot, with how, when and by whom it was confirmed', async () => {
    const made = await claimed();
    const { body } = await desk.post(`${BASE}/${made.id}/verify`, confirmation(made)).expect(200);
    expect(caseAnswer.parse(body)).toMatchObject({ state: 'verified', lot: { state: 'open' } });
    expect(body.decision).toMatchObject({
      by: deskMember.displayName,
      grade: 'certified',
      confirmedHow: 'by telephone, number from the register',
      confirmedWith: 'P. Orsino',
      confirmedOn: '2026-11-30',
    });
    const lot = await Lot.findByPk(made.lotId, { rejectOnEmpty: true });
    expect(lot).toMatchObject({ state: 'open', evidenceGrade: 'certified', mainMetal: 'Au' });
    expect(await mailsTo(made.sellerId)).toEqual(['lot-opened']);
    expect(await actsOn(made.id)).toEqual(['claim-certificate', 'verify-certificate']);
    const again = await desk.post(`${BASE}/${made.id}/verify`, {
      ...confirmation(made),
      version: body.version,
    });
    expect(again.status).toBe(409);
    expect(again.body.code).toBe('illegal-transition');
  });

  it('refuses without a claim, on a colleague’s claim, and on an older version', async () => {
    const made = await buildDeskCase();
    const view = (await desk.get(`${BASE}/${made.id}`)).body as CaseAnswer;
    const input = confirmation({ ...made, view });
    const unclaimed = await desk.post(`${BASE}/${made.id}/verify`, input);
    expect([unclaimed.status, unclaimed.body.code]).toEqual([409, 'certificate-not-claimed']);
    await claim(made.id, colleague).expect(200);
    const theirs = await desk.post(`${BASE}/${made.id}/verify`, input);
    expect([theirs.status, theirs.body.code]).toEqual([409, 'certificate-claimed']);
    const stale = await colleague.post(`${BASE}/${made.id}/verify`, input);
    expect([stale.status, stale.body.code]).toEqual([412, 'version-conflict']);
    expect((await Lot.findByPk(made.lotId))!.state).toBe('submitted');
    expect(await mailsTo(made.sellerId)).toEqual([]);
  });

  it('refuses a laboratory off the register and days that cannot be', async () => {
    const made = await claimed();
    const off = await buildLaboratory({ isActive: false });
    const refusal = async (change: object) => {
      const answer = await desk.post(`${BASE}/${made.id}/verify`, { ...confirmation(made), ...change });
      return [answer.status, answer.body.errors?.[0]?.pointer, answer.body.errors?.[0]?.code];
    };
    expect(await refusal({ laboratoryId: off.id })).toEqual([
      422,
      '/laboratoryId',
      'laboratory-not-registered',
    ]);
    expect(await refusal({ confirmedOn: '2099-01-01' })).toEqual([
      422,
      '/confirmedOn',
      'confirmation-date-wrong',
    ]);
    expect(await refusal({ confirmedOn: '2026-11-01' })).toEqual([
      422,
      '/confirmedOn',
      'confirmation-date-wrong',
    ]);
    expect((await refusal({ confirmedHow: '' }))[1]).toBe('/confirmedHow');
    expect(await actsOn(made.id)).toEqual(['claim-certificate']);
  });

  it('refuses a lot that claims more than its report gives', async () => {
    const made = await claimed({ stated: '996', reported: '995.2' });
    expect(made.view.proposedGrade).toBe('examined');
    expect(made.view.gaps).toEqual([
      'The lot claims more than the report gives (Gold): verification is refused.',
    ]);
    const answer = await desk.post(`${BASE}/${made.id}/verify`, confirmation(made)).expect(422);
    expect(answer.body.errors[0]).toMatchObject({ code: 'claims-beyond-report' });
    expect((await Lot.findByPk(made.lotId))!.state).toBe('submitted');
  });

  it('leaves a lot with a gap submitted and examined, and tells the seller why', async () => {
    const made = await claimed({ sampling: 'customer' });
    const { body } = await desk.post(`${BASE}/${made.id}/verify`, confirmation(made)).expect(200);
    expect(body).toMatchObject({
      state: 'examined',
      lot: { state: 'submitted' },
      decision: { grade: 'examined' },
    });
    const seller = await OutboxMail.findOne({ where: { memberId: made.sellerId }, rejectOnEmpty: true });
    expect(seller.mail).toBe('lot-examined');
    expect(JSON.stringify(seller.input)).toContain('neither examined nor sampled the piece itself');
    expect(body.lot.history.at(-1)).toMatchObject({ act: 'examined', who: 'the desk' });
  });

  it('takes the mark for the mass when the desk has seen it on the photos', async () => {
    const wishes = { itemMass: '', itemMark: 'HV 88' };
    const unseen = await claimed(wishes);
    const examined = await desk.post(`${BASE}/${unseen.id}/verify`, confirmation(unseen)).expect(200);
    expect(examined.body.state).toBe('examined');
    const seen = await claimed(wishes);
    const input = { ...confirmation(seen), isMarkSeen: true };
    const verified = await desk.post(`${BASE}/${seen.id}/verify`, input).expect(200);
    expect(verified.body.state).toBe('verified');
  });
});

describe('examining and returning', () => {
  it('marks the lot examined, and takes it up again when the laboratory has come to the register', async () => {
    const made = await claimed({ laboratory: null });
    const note = 'Photos and density agree with the report.';
    const { body } = await desk
      .post(`${BASE}/${made.id}/examine`, { version: made.view.version, note })
      .expect(200);
    expect(body).toMatchObject({ state: 'examined', lot: { state: 'submitted' }, can: { claim: true } });
    expect(await mailsTo(made.sellerId)).toEqual(['lot-examined']);
    const again = (await claim(made.id, colleague).expect(200)).body as CaseAnswer;
    const laboratory = await buildLaboratory();
    const verified = await colleague.post(
      `${BASE}/${made.id}/verify`,
      confirmation({ view: again, laboratory }),
    );
    expect([verified.status, verified.body.state]).toEqual([200, 'verified']);
  });

  it('gives an examined case back as examined', async () => {
    const made = await claimed();
    await desk
      .post(`${BASE}/${made.id}/examine`, { version: made.view.version, note: 'Looked at it.' })
      .expect(200);
    await claim(made.id).expect(200);
    const { body } = await desk.post(`${BASE}/${made.id}/release`).expect(200);
    expect(body.state).toBe('examined');
  });

  it('returns with a reason that the seller reads in history and mail, and frees the certificate', async () => {
    const seller = await buildMember({ canSell: true });
    const laboratory = await buildLaboratory();
    const made = await claimed({ seller, laboratory, number: 'HV-RETURN' });
    const reason = 'The report names another mass; weigh it again.';
    const { body } = await desk
      .post(`${BASE}/${made.id}/return`, { version: made.view.version, reason })
      .expect(200);
    expect(body).toMatchObject({ state: 'returned', decision: { returnReason: reason } });
    expect(await mailsTo(made.sellerId)).toEqual(['lot-returned']);
    const visitor = await app.signIn(seller);
    const lot = await visitor.get(`/api/v1/lots/${made.code}`).expect(200);
    expect(lot.body).toMatchObject({ state: 'returned', stateReason: reason });
    expect(lot.body.history.at(-1)).toMatchObject({ act: 'returned', note: reason });
    await buildDeskCase({ laboratory, number: 'HV-RETURN' });
    expect(await actsOn(made.id)).toEqual(['claim-certificate', 'return-certificate']);
  });

  it('wants a reason in words, and a claim', async () => {
    const made = await claimed();
    const short = await desk.post(`${BASE}/${made.id}/return`, { version: made.view.version, reason: 'no' });
    expect([short.status, short.body.errors[0].pointer]).toEqual([422, '/reason']);
    const theirs = await colleague.post(`${BASE}/${made.id}/examine`, {
      version: made.view.version,
      note: 'Looked at it.',
    });
    expect([theirs.status, theirs.body.code]).toEqual([409, 'certificate-claimed']);
  });
});
