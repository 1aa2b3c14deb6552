import type { z } from 'zod';
import { deadMailsAnswer, type DeadMailsAnswer } from '#shared/schemas/admin.ts';
import { idParam } from '#shared/schemas/common.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { countDeadMails, findDeadMails, namesOfReaders } from './mail-queries.ts';
import { presentDeadMail } from './mail-presenter.ts';
import { sendAgain } from './send-again.ts';

async function answerDeadMails(): Promise<DeadMailsAnswer> {
  const [mails, total] = [await findDeadMails(), await countDeadMails()];
  const names = await namesOfReaders(mails);
  return { rows: mails.map((mail) => presentDeadMail(mail, names)), total };
}

export const mailRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/admin/mails',
    summary: 'Mails that were given up, the newest first',
    access: 'admin',
    limit: 'read',
    answer: deadMailsAnswer,
    handle: async ({ res }) => {
      res.json(await answerDeadMails());
    },
  }),
  defineRoute<z.infer<typeof idParam>>({
    method: 'post',
    path: '/api/v1/admin/mails/:id/send-again',
    summary: 'Puts a given-up mail back into the outbox; answers those that are left',
    access: 'admin',
    limit: 'write',
    params: idParam,
    answer: deadMailsAnswer,
    handle: async ({ res, params, actor }) => {
      await withTransaction({}, (unit) => sendAgain(params.id, unit, actor));
      res.json(await answerDeadMails());
    },
  }),
];
