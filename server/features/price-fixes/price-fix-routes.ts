import type { z } from 'zod';
import { percentText } from '#shared/lot-pricing.ts';
import { lotAnswer, lotParams, priceFixAnswer, type PriceFixAnswer } from '#shared/schemas/lots.ts';
import { withIdempotentTransaction } from '#server/database/idempotent-transaction.ts';
import { databaseNow, withTransaction } from '#server/database/transaction.ts';
import { answerLot } from '#server/features/lots/answer-lot.ts';
import { lotIdOf } from '#server/features/lots/own-lot.ts';
import { newestQuotes } from '#server/features/quotes/quote-queries.ts';
import { moneyAnswer } from '#server/money-answer.ts';
import type { Lot } from '#server/models/lot.ts';
import type { PriceFix } from '#server/models/price-fix.ts';
import { defineRoute, type Actor, type RouteDefinition } from '#server/routing/define-route.ts';
import { endPastFix, giveUpPriceFix } from './end-price-fix.ts';
import { fixPrice } from './fix-price.ts';
import { pastFixesOf } from './price-fix-queries.ts';

type Code = z.infer<typeof lotParams>;

function presentFix({ fix, lot }: { fix: PriceFix; lot: Lot }): PriceFixAnswer {
  return {
    lotCode: lot.code,
    percent: percentText(fix.percent),
    price: moneyAnswer(fix.priceMinor),
    total: moneyAnswer(fix.priceMinor + (lot.shippingMinor ?? 0n)),
    until: fix.fixedUntil.toISOString(),
    quotes: fix.quotes as PriceFixAnswer['quotes'],
  };
}

/** A fix whose time is over holds its member up no longer, also where its job has not run yet. */
async function endOwnPastFixes(actor: Actor): Promise<void> {
  for (const { lotId } of await pastFixesOf(actor.id, await databaseNow())) {
    await withTransaction({ lots: [lotId] }, (unit) => endPastFix({ lotId }, unit));
  }
}

export const priceFixRoutes: RouteDefinition[] = [
  defineRoute<Code>({
    method: 'post',
    path: '/api/v1/lots/:code/price-fix',
    summary: 'Fix a linked price at the newest quotes; the lot is held for ten minutes',
    access: 'member',
    limit: 'write',
    movesMoney: true,
    params: lotParams,
    answer: priceFixAnswer,
    handle: async ({ params, actor, idempotency, res }) => {
      const lotId = await lotIdOf(params.code);
      await endOwnPastFixes(actor);
      const quotes = await newestQuotes(await databaseNow());
      const { status, answer } = await withIdempotentTransaction(
        idempotency,
        { members: [actor.id], lots: [lotId] },
        async (unit) => ({
          status: 201,
          answer: presentFix(await fixPrice({ lotId }, { ...unit, quotes }, actor)),
        }),
      );
      res.status(status).json(answer);
    },
  }),
  defineRoute<Code>({
    method: 'post',
    path: '/api/v1/lots/:code/price-fix/give-up',
    summary: 'Give up the own price fix before its time',
    access: 'member',
    limit: 'write',
    params: lotParams,
    answer: lotAnswer,
    handle: async ({ params, actor, res }) => {
      const lotId = await lotIdOf(params.code);
      await withTransaction({ lots: [lotId] }, (unit) => giveUpPriceFix({ lotId }, unit, actor));
      res.json(await answerLot(params.code, actor));
    },
  }),
];
