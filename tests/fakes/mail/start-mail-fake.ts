import express, { type Express } from 'express';
import { z } from 'zod';
import {
  answerControl,
  answerErrors,
  BadRequest,
  readBody,
  serveOnLoopback,
  type RunningFake,
} from '../kit/serve.ts';
import { MailDoor } from './mail-door.ts';
import { renderMailbox, renderMessage } from './mail-pages.ts';
import { openMailStore, type KeptMessage, type MailStore } from './mail-store.ts';

export type MailFakeOptions = {
  port?: number;
  smtpPort?: number;
  dataDir?: string | undefined;
  systemNowMs?: () => number;
};
export type RunningMailFake = RunningFake & { smtpPort: number; smtpUrl: string };

const blankToNull = (value: unknown) => (value === '' || value === undefined ? null : value);
const count = z.preprocess(blankToNull, z.coerce.number().int().positive().nullable());
const faultSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('none') }),
  z.object({
    kind: z.literal('refuse'),
    code: z.coerce.number().pipe(z.union([z.literal(450), z.literal(550)])),
    count,
    to: z.preprocess(blankToNull, z.string().nullable()),
  }),
  z.object({ kind: z.literal('delay'), seconds: z.coerce.number().min(0).max(600), count }),
  z.object({ kind: z.literal('down') }),
]);

/** A mail may carry style and inline pictures; nothing in it may run or reach another host. */
const pagePolicy =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; form-action 'self'; base-uri 'none'";

function queryText(value: unknown): string | null {
  return typeof value === 'string' && value !== '' ? value : null;
}

function wire({ attachments, ...message }: KeptMessage) {
  return {
    ...message,
    attachments: attachments.map(({ filename, contentType, size }, index) => ({
      filename,
      contentType,
      size,
      url: `/control/attachments/${message.id}/${index + 1}`,
    })),
  };
}

function mountPages(app: Express, store: MailStore, door: MailDoor) {
  app.use((_req, res, next) => {
    res.set({ 'content-security-policy': pagePolicy, 'x-content-type-options': 'nosniff' });
    next();
  });
  app.get('/', (req, res) => {
    res.type('html').send(renderMailbox(store, door, queryText(req.query.to)));
  });
  app.get('/messages/:id', (req, res) => {
    const message = store.find(req.params.id);
    if (!message) throw new BadRequest('no such message', 404);
    res.type('html').send(renderMessage(message));
  });
}

function mountControl(app: Express, store: MailStore, door: MailDoor) {
  app.get('/control/health', (_req, res) => void res.json({ ready: true }));
  app.get('/control/messages', (req, res) => {
    res.json({ messages: store.list(queryText(req.query.to)).map(wire) });
  });
  app.get('/control/messages/:id', (req, res) => {
    const message = store.find(req.params.id);
    if (!message) throw new BadRequest('no such message', 404);
    res.json(wire(message));
  });
  app.get('/control/attachments/:id/:number', (req, res) => {
    const file = store.find(req.params.id)?.attachments[parseInt(req.params.number, 10) - 1];
    if (!file) throw new BadRequest('no such attachment', 404);
    res.attachment(file.filename).set('content-type', file.contentType).send(file.content);
  });
  app.post('/control/faults', async (req, res) => {
    await door.setFault(readBody(faultSchema, req.body));
    answerControl(req, res, { fault: door.fault });
  });
  app.post('/control/clear', (req, res) => {
    store.clear();
    answerControl(req, res, { ok: true });
  });
}

/** Starts the mail server's stand-in: SMTP on one loopback port, the mailbox page on another. */
export async function startMailFake(options: MailFakeOptions = {}): Promise<RunningMailFake> {
  const store = await openMailStore(options.dataDir, options.systemNowMs ?? Date.now);
  const door = new MailDoor(store, options.smtpPort ?? 0);
  await door.open();
  const app = express();
  app.use(express.json(), express.urlencoded({ extended: false }));
  mountPages(app, store, door);
  mountControl(app, store, door);
  app.use(answerErrors);
  const web = await serveOnLoopback(app, options.port ?? 0);
  return {
    ...web,
    smtpPort: door.port,
    smtpUrl: `smtp://127.0.0.1:${door.port}`,
    close: async () => {
      await door.close();
      await web.close();
    },
  };
}
