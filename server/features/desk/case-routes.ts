import { idParam } from '#shared/schemas/common.ts';
import {
  caseAnswer,
  examineRequest,
  queueAnswer,
  returnRequest,
  verifyRequest,
  type CaseAnswer,
  type QueueAnswer,
} from '#shared/schemas/desk.ts';
import { ForbiddenError, NotFoundError } from '#server/app-error.ts';
import { databaseNow, withTransaction, type Unit } from '#server/database/transaction.ts';
import { defineRoute, type Actor, type RouteDefinition } from '#server/routing/define-route.ts';
import { flagCase } from './case-flags.ts';
import { isOwnCase } from './case-policy.ts';
import { presentCase, presentQueueRow } from './case-presenter.ts';
import {
  completedDealsOf,
  findCase,
  historyOfLot,
  lotIdOfCertificate,
  namesOfMembers,
  queueOfCases,
} from './case-queries.ts';
import { claimCertificate } from './claim-certificate.ts';
import { examineCertificate } from './examine-certificate.ts';
import { findFlagSources } from './flag-sources.ts';
import { releaseCertificate } from './release-certificate.ts';
import { returnCertificate } from './return-certificate.ts';
import { verifyCertificate } from './verify-certificate.ts';

const BASE = '/api/v1/desk/certificates';

async function today(): Promise<string> {
  return (await databaseNow()).toISOString().slice(0, 10);
}

async function readQueue(actor: Actor): Promise<QueueAnswer> {
  const { waiting, decided } = await queueOfCases();
  const all = [...waiting, ...decided];
  const sources = await findFlagSources(all);
  const names = await namesOfMembers(all.map(({ certificate }) => certificate.claimedById));
  const day = await today();
  const row = (each: (typeof all)[number]) =>
    presentQueueRow(each, { actor, names, flags: flagCase(each, sources, day) });
  return { waiting: waiting.map(row), decided: decided.map(row) };
}

async function readCase(id: string, actor: Actor): Promise<CaseAnswer> {
  const each = await findCase(id);
  if (each === null) throw new NotFoundError();
  const { certificate, lot } = each;
  if (isOwnCase(actor, lot)) throw new ForbiddenError('own-case');
  const [sources, names, events, completedDeals, day] = await Promise.all([
    findFlagSources([each]),
    namesOfMembers([certificate.claimedById, certificate.decidedById]),
    historyOfLot(lot.id),
    completedDealsOf(lot.sellerId),
    today(),
  ]);
  const flags = flagCase(each, sources, day);
  return presentCase(each, { actor, names, events, completedDeals, flags });
}

/** Takes the lot's guard row, runs the command, and answers the case as it then stands. */
async function changeCase(
  id: string,
  actor: Actor,
  command: (unit: Unit) => Promise<unknown>,
): Promise<CaseAnswer> {
  const lotId = await lotIdOfCertificate(id);
  await withTransaction({ lots: [lotId] }, command);
  return readCase(id, actor);
}

export const caseRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: BASE,
    summary: 'Certificates that wait, oldest first, and those decided last',
    access: 'desk',
    limit: 'read',
    answer: queueAnswer,
    handle: async ({ res, actor }) => {
      res.json(await readQueue(actor));
    },
  }),
  defineRoute({
    method: 'get',
    path: `${BASE}/:id`,
    summary: 'A case: document, report and lot side by side, differences and flags',
    access: 'desk',
    limit: 'read',
    params: idParam,
    answer: caseAnswer,
    handle: async ({ res, params, actor }) => {
      res.json(await readCase(params.id, actor));
    },
  }),
  defineRoute({
    method: 'post',
    path: `${BASE}/:id/claim`,
    summary: 'Take a waiting certificate',
    access: 'desk',
    limit: 'write',
    params: idParam,
    answer: caseAnswer,
    handle: async ({ res, params: { id }, actor }) => {
      res.json(await changeCase(id, actor, (unit) => claimCertificate(id, unit, actor)));
    },
  }),
  defineRoute({
    method: 'post',
    path: `${BASE}/:id/release`,
    summary: 'Give a claim back',
    access: 'desk',
    limit: 'write',
    params: idParam,
    answer: caseAnswer,
    handle: async ({ res, params: { id }, actor }) => {
      res.json(await changeCase(id, actor, (unit) => releaseCertificate(id, unit, actor)));
    },
  }),
  defineRoute({
    method: 'post',
    path: `${BASE}/:id/verify`,
    summary: 'Verify a certificate that was confirmed with its laboratory',
    access: 'desk',
    limit: 'write',
    params: idParam,
    body: verifyRequest,
    answer: caseAnswer,
    handle: async ({ res, params: { id }, body, actor }) => {
      res.json(await changeCase(id, actor, (unit) => verifyCertificate({ ...body, id }, unit, actor)));
    },
  }),
  defineRoute({
    method: 'post',
    path: `${BASE}/:id/examine`,
    summary: 'Record that the evidence was looked at without a verified certificate',
    access: 'desk',
    limit: 'write',
    params: idParam,
    body: examineRequest,
    answer: caseAnswer,
    handle: async ({ res, params: { id }, body, actor }) => {
      res.json(await changeCase(id, actor, (unit) => examineCertificate({ ...body, id }, unit, actor)));
    },
  }),
  defineRoute({
    method: 'post',
    path: `${BASE}/:id/return`,
    summary: 'Return the lot to its seller with a reason',
    access: 'desk',
    limit: 'write',
    params: idParam,
    body: returnRequest,
    answer: caseAnswer,
    handle: async ({ res, params: { id }, body, actor }) => {
      res.json(await changeCase(id, actor, (unit) => returnCertificate({ ...body, id }, unit, actor)));
    },
  }),
];
