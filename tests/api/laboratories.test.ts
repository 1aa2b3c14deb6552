import { beforeAll, describe, expect, it } from 'vitest';
import { laboratoriesAnswer, laboratoryAnswer, type LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import { buildLaboratory } from '#tests/factories/build-desk-case.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const URL_PATH = '/api/v1/laboratories';
let desk: Visitor;
let member: Visitor;
let next = 0;

beforeAll(async () => {
  desk = await app.signIn(await buildMember({ role: 'desk' }));
  member = await app.signIn(await buildMember());
});

function entry(change: object = {}) {
  next += 1;
  return {
    name: `Assay house ${next}`,
    accreditationBody: 'Accreditation of Harrow Vale',
    accreditationNumber: `L-${next}`,
    scope: 'Gold, fire assay',
    region: 'Harrow Vale',
    contact: 'office@assay.example',
    validUntil: '2028-06-30',
    isActive: true,
    ...change,
  };
}

async function listed(who: Visitor): Promise<LaboratoryAnswer[]> {
  return laboratoriesAnswer.parse((await who.get(URL_PATH).expect(200)).body).laboratories;
}

describe('the register of laboratories', () => {
  it('shows members the active ones without how to reach them, staff all', async () => {
    const [active, retired] = [await buildLaboratory(), await buildLaboratory({ isActive: false })];
    const forMembers = await listed(member);
    expect(forMembers.map((row) => row.id)).toContain(active.id);
    expect(forMembers.map((row) => row.id)).not.toContain(retired.id);
    expect(forMembers.every((row) => row.contact === '')).toBe(true);
    const forStaff = await listed(desk);
    expect(forStaff.find((row) => row.id === retired.id)).toMatchObject({ isActive: false });
    expect(forStaff.find((row) => row.id === active.id)!.contact).toBe(active.contact);
  });

  it('takes a new laboratory and writes it in the trail', async () => {
    const input = entry();
    const { body } = await desk.post(URL_PATH, input).expect(201);
    expect(laboratoryAnswer.parse(body)).toMatchObject(input);
    const [line] = await AuditEntry.findAll({ where: { subjectId: body.id } });
    expect(line).toMatchObject({ act: 'add-laboratory', subjectKind: 'laboratory' });
  });

  it('changes one, and the trail keeps what stood there', async () => {
    const { body } = await desk.post(URL_PATH, entry()).expect(201);
    const change = { ...entry(), accreditationNumber: body.accreditationNumber, validUntil: '2027-01-31' };
    const changed = await desk.put(`${URL_PATH}/${body.id}`, change).expect(200);
    expect(changed.body).toMatchObject({ validUntil: '2027-01-31', name: change.name });
    const lines = await AuditEntry.findAll({ where: { subjectId: body.id, act: 'change-laboratory' } });
    expect(lines[0]!.detail).toMatchObject({
      changes: { validUntil: { from: '2028-06-30', to: '2027-01-31' } },
    });
  });

  it('refuses an accreditation that stands there already, when added and when changed', async () => {
    const first = (await desk.post(URL_PATH, entry()).expect(201)).body as LaboratoryAnswer;
    const twin = entry({ accreditationNumber: first.accreditationNumber });
    const added = await desk.post(URL_PATH, twin).expect(422);
    expect(added.body.errors).toMatchObject([
      { pointer: '/accreditationNumber', code: 'accreditation-taken' },
    ]);
    const second = (await desk.post(URL_PATH, entry()).expect(201)).body as LaboratoryAnswer;
    const changed = await desk.put(`${URL_PATH}/${second.id}`, twin).expect(422);
    expect(changed.body.errors[0].code).toBe('accreditation-taken');
    expect((await Laboratory.findByPk(second.id))!.accreditationNumber).toBe(second.accreditationNumber);
  });

  it('answers all faults at once, and nothing there with 404', async () => {
    const answer = await desk
      .post(URL_PATH, { ...entry(), name: ' ', scope: '', validUntil: 'soon' })
      .expect(422);
    expect(answer.body.errors.map((fault: { pointer: string }) => fault.pointer).sort()).toEqual([
      '/name',
      '/scope',
      '/validUntil',
    ]);
    await desk.put(`${URL_PATH}/00000000-0000-7000-8000-00000000dead`, entry()).expect(404);
  });

  it('is written by the desk alone', async () => {
    const { id } = await buildLaboratory();
    const lab = await app.signIn(await buildMember({ role: 'lab' }));
    for (const visitor of [member, lab]) {
      await visitor.post(URL_PATH, entry()).expect(403);
      await visitor.put(`${URL_PATH}/${id}`, entry()).expect(403);
    }
    await (await app.visitor()).get(URL_PATH).expect(401);
  });
});
