import type { z } from 'zod';
import {
  contestRequest,
  dealAnswer,
  dealParams,
  dealsAnswer,
  purchaseRequest,
  shipRequest,
} from '#shared/schemas/deals.ts';
import { lotParams } from '#shared/schemas/lots.ts';
import { NotFoundError } from '#server/app-error.ts';
import { withIdempotentTransaction } from '#server/database/idempotent-transaction.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { lotIdOf } from '#server/features/lots/own-lot.ts';
import { pauseBelowFloor } from '#server/features/lots/pause-below-floor.ts';
import { newestQuotes, quoteRefs } from '#server/features/quotes/quote-queries.ts';
import { renderSheetPdf } from '#server/features/sheets/sheet-pdf.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { acceptDeal } from './accept-deal.ts';
import { answerDeal, changeDeal } from './answer-deal.ts';
import { confirmDelivery } from './confirm-delivery.ts';
import { contestDeal } from './contest-deal.ts';
import { sideOf } from './deal-policy.ts';
import { presentDeals } from './deal-presenter.ts';
import { findDealIds, listDealsOf, loadDealView } from './deal-queries.ts';
import { sheetFor } from './deal-sheets.ts';
import { purchaseLot } from './purchase-lot.ts';
import { shipDeal } from './ship-deal.ts';

type DealParams = z.infer<typeof dealParams>;

const BELOW_FLOOR = {
  status: 409,
  answer: {
    refusal: {
      code: 'price-below-floor',
      detail:
        'The metal has risen past the floor that the seller set; the lot is paused until it is priced anew.',
    },
  },
};

const purchaseRoute = defineRoute<z.infer<typeof lotParams>, unknown, z.infer<typeof purchaseRequest>>({
  method: 'post',
  path: '/api/v1/lots/:code/purchase',
  summary: 'Buy a lot outright; the lot is reserved until it is paid or the time is over',
  access: 'member',
  limit: 'write',
  movesMoney: true,
  params: lotParams,
  body: purchaseRequest,
  answer: dealAnswer,
  handle: async ({ params, body, actor, idempotency, res }) => {
    const lotId = await lotIdOf(params.code);
    const quotes = await newestQuotes(await databaseNow());
    const { status, answer } = await withIdempotentTransaction(
      idempotency,
      { lots: [lotId] },
      async (unit) => {
        // The refusal is the answer, so that the pause is written with it.
        if (await pauseBelowFloor({ lotId, quotes: quoteRefs(quotes) }, unit)) return BELOW_FLOOR;
        const { total, delivery } = body;
        const deal = await purchaseLot({ lotId, total, delivery }, { ...unit, quotes }, actor);
        return { status: 201, answer: await answerDeal(deal.id, actor, unit) };
      },
    );
    res.status(status).json(answer);
  },
});

const readRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/deals',
    summary: 'Where I stand: my deals as buyer and seller',
    access: 'member',
    limit: 'read',
    answer: dealsAnswer,
    handle: async ({ actor, res }) => {
      res.json(presentDeals(await listDealsOf(actor.id), actor, await databaseNow()));
    },
  }),
  defineRoute<DealParams>({
    method: 'get',
    path: '/api/v1/deals/:code',
    summary: 'One deal, for its sides and the desk',
    access: 'member',
    limit: 'read',
    params: dealParams,
    answer: dealAnswer,
    handle: async ({ params, actor, res }) => {
      const { id } = await findDealIds(params.code);
      res.json(await answerDeal(id, actor));
    },
  }),
  defineRoute<DealParams>({
    method: 'get',
    path: '/api/v1/deals/:code/sheet.pdf',
    summary: 'The deal’s sheet as PDF: the final one, or the provisional one until then',
    access: 'member',
    limit: 'read',
    params: dealParams,
    handle: async ({ params, actor, res }) => {
      const { id } = await findDealIds(params.code);
      const view = await loadDealView(id);
      const side = sideOf(actor, view.deal);
      if (side === null) throw new NotFoundError();
      const sheet = sheetFor(side, view.final ?? view.provisional);
      const pdf = await renderSheetPdf({
        sheet,
        dealCode: view.deal.code,
        lotCode: view.deal.lot.code,
        lotTitle: view.deal.lot.title ?? '',
        timeZone: actor.timeZone,
      });
      res
        .type('application/pdf')
        .set('Content-Disposition', `inline; filename="scruple-${view.deal.code}-${sheet.moment}.pdf"`)
        .send(pdf);
    },
  }),
];

const actRoutes: RouteDefinition[] = [
  defineRoute<DealParams, unknown, z.infer<typeof shipRequest>>({
    method: 'post',
    path: '/api/v1/deals/:code/ship',
    summary: 'The seller has shipped: carrier, tracking number, insured value',
    access: 'member',
    limit: 'write',
    whileSuspended: true,
    params: dealParams,
    body: shipRequest,
    answer: dealAnswer,
    handle: async ({ params, body, actor, res }) => {
      res.json(
        await changeDeal(params.code, actor, (dealId, unit) => shipDeal({ ...body, dealId }, unit, actor)),
      );
    },
  }),
  defineRoute<DealParams>({
    method: 'post',
    path: '/api/v1/deals/:code/confirm-delivery',
    summary: 'The buyer confirms a delivery without signature',
    access: 'member',
    limit: 'write',
    whileSuspended: true,
    params: dealParams,
    answer: dealAnswer,
    handle: async ({ params, actor, res }) => {
      res.json(await changeDeal(params.code, actor, (dealId, unit) => confirmDelivery(dealId, unit, actor)));
    },
  }),
  defineRoute<DealParams>({
    method: 'post',
    path: '/api/v1/deals/:code/accept',
    summary: 'The buyer accepts: the deal is settled and the money released',
    access: 'member',
    limit: 'write',
    movesMoney: true,
    whileSuspended: true,
    params: dealParams,
    answer: dealAnswer,
    handle: async ({ params, actor, idempotency, res }) => {
      const { id } = await findDealIds(params.code);
      const { status, answer } = await withIdempotentTransaction(
        idempotency,
        { deals: [id] },
        async (unit) => {
          await acceptDeal(id, unit, actor);
          return { status: 200, answer: await answerDeal(id, actor, unit) };
        },
      );
      res.status(status).json(answer);
    },
  }),
  defineRoute<DealParams, unknown, z.infer<typeof contestRequest>>({
    method: 'post',
    path: '/api/v1/deals/:code/contest',
    summary: 'The buyer contests: the money stays held until the desk has ruled',
    access: 'member',
    limit: 'write',
    whileSuspended: true,
    params: dealParams,
    body: contestRequest,
    answer: dealAnswer,
    handle: async ({ params, body, actor, res }) => {
      res.json(
        await changeDeal(params.code, actor, (dealId, unit) => contestDeal({ ...body, dealId }, unit, actor)),
      );
    },
  }),
];

export const dealRoutes: RouteDefinition[] = [purchaseRoute, ...readRoutes, ...actRoutes];
