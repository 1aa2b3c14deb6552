import type { z } from 'zod';
import { dealAnswer, dealParams, rulingRequest, takeUpRequest } from '#shared/schemas/deals.ts';
import { deskDealsAnswer } from '#shared/schemas/desk.ts';
import { reasonRequest } from '#shared/schemas/lots.ts';
import { withIdempotentTransaction } from '#server/database/idempotent-transaction.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { answerDeal, changeDeal } from './answer-deal.ts';
import { presentDeskDeals } from './deal-presenter.ts';
import { findDealIds, listContestedDeals, listOverdueInspections } from './deal-queries.ts';
import { freezeDeal, unfreezeDeal } from './freeze-deal.ts';
import { ruleDeal } from './rule-deal.ts';
import { takeUpDeal } from './take-up-deal.ts';

type DealParams = z.infer<typeof dealParams>;

export const deskDealRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/desk/deals',
    summary: 'Deals that wait for the desk: contested ones, and deliveries that got no answer in time',
    access: 'desk',
    limit: 'read',
    answer: deskDealsAnswer,
    handle: async ({ actor, res }) => {
      const [contested, overdue] = await Promise.all([
        listContestedDeals(),
        listOverdueInspections(await databaseNow()),
      ]);
      res.json(presentDeskDeals({ contested, overdue }, actor));
    },
  }),
  defineRoute<DealParams, unknown, z.infer<typeof rulingRequest>>({
    method: 'post',
    path: '/api/v1/desk/deals/:code/ruling',
    summary: 'Rule on a contested deal: refund in full or release',
    access: 'desk',
    limit: 'write',
    movesMoney: true,
    params: dealParams,
    body: rulingRequest,
    answer: dealAnswer,
    handle: async ({ params, body, actor, idempotency, res }) => {
      const { id, lotId } = await findDealIds(params.code);
      const locks = { lots: [lotId], deals: [id] };
      const { status, answer } = await withIdempotentTransaction(idempotency, locks, async (unit) => {
        await ruleDeal({ ...body, dealId: id }, unit, actor);
        return { status: 200, answer: await answerDeal(id, actor, unit) };
      });
      res.status(status).json(answer);
    },
  }),
  defineRoute<DealParams, unknown, z.infer<typeof takeUpRequest>>({
    method: 'post',
    path: '/api/v1/desk/deals/:code/take-up',
    summary: 'Take up a delivered deal that the buyer has not answered in time; it then waits for a ruling',
    access: 'desk',
    limit: 'write',
    params: dealParams,
    body: takeUpRequest,
    answer: dealAnswer,
    handle: async ({ params, body, actor, res }) => {
      res.json(
        await changeDeal(params.code, actor, (dealId, unit) => takeUpDeal({ ...body, dealId }, unit, actor)),
      );
    },
  }),
  defineRoute<DealParams, unknown, z.infer<typeof reasonRequest>>({
    method: 'post',
    path: '/api/v1/desk/deals/:code/freeze',
    summary: 'Stop a deal that money is held for, with a reason',
    access: 'desk',
    limit: 'write',
    params: dealParams,
    body: reasonRequest,
    answer: dealAnswer,
    handle: async ({ params, body, actor, res }) => {
      res.json(
        await changeDeal(params.code, actor, (dealId, unit) => freezeDeal({ ...body, dealId }, unit, actor)),
      );
    },
  }),
  defineRoute<DealParams>({
    method: 'post',
    path: '/api/v1/desk/deals/:code/unfreeze',
    summary: 'Lift a freeze; the running deadline is moved by its length',
    access: 'desk',
    limit: 'write',
    params: dealParams,
    answer: dealAnswer,
    handle: async ({ params, actor, res }) => {
      res.json(await changeDeal(params.code, actor, (dealId, unit) => unfreezeDeal(dealId, unit, actor)));
    },
  }),
];
