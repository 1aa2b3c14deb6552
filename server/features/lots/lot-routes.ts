import { z } from 'zod';
import { lotCode } from '#shared/schemas/common.ts';
import {
  lotAnswer,
  lotParams,
  myLotsAnswer,
  priceRequest,
  reasonRequest,
  saveDraftRequest,
} from '#shared/schemas/lots.ts';
import { withTransaction, type Unit } from '#server/database/transaction.ts';
import { addCopies, dropCopies, storeCopies } from '#server/features/photos/copy-photos.ts';
import { removeFiles } from '#server/features/photos/remove-files.ts';
import type { Lot } from '#server/models/lot.ts';
import {
  defineRoute,
  type Actor,
  type RouteContext,
  type RouteDefinition,
} from '#server/routing/define-route.ts';
import { answerLot } from './answer-lot.ts';
import { changePrice } from './change-price.ts';
import { createDraft } from './create-draft.ts';
import { deleteDraft } from './delete-draft.ts';
import { findMyLots } from './my-lots.ts';
import { lotIdOf } from './own-lot.ts';
import { pauseLot } from './pause-lot.ts';
import { redraftLot } from '#server/features/drafting/redraft-lot.ts';
import { reopenLot } from './reopen-lot.ts';
import { saveDraft } from '#server/features/drafting/save-draft.ts';
import { submitLot } from '#server/features/drafting/submit-lot.ts';
import { withdrawLot } from './withdraw-lot.ts';

type Code = z.infer<typeof lotParams>;
const LOT = '/api/v1/lots/:code';

/** Runs a command on a lot under its lock and answers the lot as it then stands. */
async function changeLot<B>(
  { params, res, actor }: RouteContext<Code, unknown, B>,
  command: (lotId: string, unit: Unit, actor: Actor) => Promise<unknown>,
): Promise<void> {
  const lotId = await lotIdOf(params.code);
  await withTransaction({ lots: [lotId] }, (unit) => command(lotId, unit, actor));
  res.json(await answerLot(params.code, actor));
}

/** A copy takes the photos along: their bytes are stored first, and go again when no draft comes of it. */
async function makeDraft({ copyOf }: { copyOf?: string | undefined }, actor: Actor): Promise<Lot> {
  const copies = copyOf === undefined ? [] : await storeCopies(copyOf, actor);
  try {
    return await withTransaction({}, async (unit) => {
      const lot = await createDraft({ copyOf }, unit, actor);
      await addCopies({ lotId: lot.id, copies }, unit, actor);
      return lot;
    });
  } catch (error) {
    await dropCopies(copies);
    throw error;
  }
}

/** A change of state that needs no more than the lot's code. */
function actRoute(
  act: string,
  summary: string,
  command: (input: { lotId: string }, unit: Unit, actor: Actor) => Promise<unknown>,
): RouteDefinition {
  return defineRoute({
    method: 'post',
    path: `${LOT}/${act}`,
    summary,
    access: 'member',
    limit: 'write',
    params: lotParams,
    answer: lotAnswer,
    handle: (context) => changeLot(context, (lotId, unit, actor) => command({ lotId }, unit, actor)),
  });
}

const readRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/me/lots',
    summary: 'My own lots in every state',
    access: 'member',
    limit: 'read',
    answer: myLotsAnswer,
    handle: async ({ res, actor }) => {
      res.json(await findMyLots(actor));
    },
  }),
  defineRoute({
    method: 'get',
    path: LOT,
    summary: 'One lot with its assay, evidence, photos, sheet and what the viewer may do',
    access: 'public',
    limit: 'read',
    params: lotParams,
    answer: lotAnswer,
    handle: async ({ params, res, viewer }) => {
      res.json(await answerLot(params.code, viewer));
    },
  }),
];

const draftRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: '/api/v1/lots',
    summary: 'A new draft, blank or as a copy of an own lot, photos included',
    access: 'member',
    limit: 'write',
    body: z.object({ copyOf: lotCode.optional() }),
    answer: lotAnswer,
    handle: async ({ body, res, actor }) => {
      const lot = await makeDraft(body, actor);
      res.status(201).location(`/api/v1/lots/${lot.code}`);
      res.json(await answerLot(lot.code, actor));
    },
  }),
  defineRoute({
    method: 'put',
    path: `${LOT}/draft`,
    summary: 'Keeps the draft as typed; refuses a save of an older version',
    access: 'member',
    limit: 'write',
    params: lotParams,
    body: saveDraftRequest,
    answer: lotAnswer,
    handle: (context) =>
      changeLot(context, (lotId, unit, actor) => saveDraft({ lotId, ...context.body }, unit, actor)),
  }),
  defineRoute({
    method: 'delete',
    path: `${LOT}/draft`,
    summary: 'Removes a draft that was never submitted',
    access: 'member',
    limit: 'write',
    params: lotParams,
    handle: async ({ params, res, actor }) => {
      const lotId = await lotIdOf(params.code);
      const files = await withTransaction({ lots: [lotId] }, (unit) => deleteDraft({ lotId }, unit, actor));
      await removeFiles(files);
      res.status(204).end();
    },
  }),
];

export const lotRoutes: RouteDefinition[] = [
  ...readRoutes,
  ...draftRoutes,
  actRoute('submit', 'Hands the draft to the desk; tells all that is missing at once', submitLot),
  actRoute('redraft', 'Takes a returned lot back into drafting', redraftLot),
  actRoute('pause', 'Takes an open lot off the register', pauseLot),
  actRoute('reopen', 'Puts a paused lot back on the register', reopenLot),
  defineRoute({
    method: 'post',
    path: `${LOT}/withdraw`,
    summary: 'Takes a lot off for good',
    access: 'member',
    limit: 'write',
    params: lotParams,
    body: reasonRequest,
    answer: lotAnswer,
    handle: (context) =>
      changeLot(context, (lotId, unit, actor) => withdrawLot({ lotId, ...context.body }, unit, actor)),
  }),
  defineRoute({
    method: 'post',
    path: `${LOT}/price`,
    summary: 'Changes the price of an open lot',
    access: 'member',
    limit: 'write',
    params: lotParams,
    body: priceRequest,
    answer: lotAnswer,
    handle: (context) =>
      changeLot(context, (lotId, unit, actor) => changePrice({ lotId, ...context.body }, unit, actor)),
  }),
];
