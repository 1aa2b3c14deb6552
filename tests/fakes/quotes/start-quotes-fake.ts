import { setTimeout as wait } from 'node:timers/promises';
import express, { type Express, type Request, type Response } from 'express';
import { z } from 'zod';
import {
  answerControl,
  answerErrors,
  BadRequest,
  readBody,
  serveOnLoopback,
  type RunningFake,
} from '../kit/serve.ts';
import { openStateFile } from '../kit/state-file.ts';
import { initialBookState, QuoteBook } from './book.ts';
import { renderQuotesPage } from './quotes-page.ts';
import { quotedCodes, type QuotedCode } from './walk.ts';

export type QuotesFakeOptions = {
  port?: number;
  dataDir?: string | undefined;
  seed?: number;
  /** Accepted bearer key; any key when left out. */
  apiKey?: string | undefined;
  startedAtMs?: number;
  systemNowMs?: () => number;
  slowMs?: number;
};

const codeSchema = z.enum(quotedCodes);
const blankToNull = (value: unknown) => (value === '' || value === undefined ? null : value);
const scenarioSchema = z.object({
  scenario: z.string(),
  code: z.preprocess(blankToNull, codeSchema.nullable()),
  percent: z.preprocess((value) => (value === undefined ? '5' : String(value)), z.string()),
  polls: z.preprocess(blankToNull, z.coerce.number().int().positive().nullable()),
});
const clockSchema = z.object({ advanceSeconds: z.coerce.number().int().min(0).max(31_536_000) });
const setSchema = z.object({ code: codeSchema, mid: z.preprocess(blankToNull, z.string().nullable()) });

function codesOf(req: Request): QuotedCode[] {
  const text = typeof req.query.codes === 'string' ? req.query.codes : quotedCodes.join(',');
  const result = z.array(codeSchema).min(1).safeParse(text.split(','));
  if (!result.success) throw new BadRequest('codes: a list out of XAU, XAG, XPT, XPD');
  return result.data;
}

function dayOf(req: Request, name: string): number {
  const result = z.iso.date().safeParse(req.query[name]);
  if (!result.success) throw new BadRequest(`${name}: a date like 2026-10-02`);
  return Date.parse(`${result.data}T00:00:00Z`) / 86_400_000;
}

/** Plays the service's running fault. True: the request is answered or cut. */
async function disturbed(book: QuoteBook, res: Response, slowMs: number): Promise<string | null> {
  const scenario = book.takeServiceScenario();
  if (scenario === 'down') res.status(503).json({ error: 'unavailable' });
  else if (scenario === 'reset') res.socket?.resetAndDestroy();
  else if (scenario === 'garbage-html') res.type('html').send('<html><body>Maintenance</body></html>');
  else if (scenario === 'slow') await wait(slowMs);
  return scenario;
}

const isAnswered = (scenario: string | null) =>
  scenario === 'down' || scenario === 'reset' || scenario === 'garbage-html';

function mountService(app: Express, book: QuoteBook, apiKey: string | undefined, slowMs: number) {
  app.use('/v1', (req, res, next) => {
    const key = /^Bearer (\S+)$/.exec(req.headers.authorization ?? '')?.[1];
    if (!key || (apiKey && key !== apiKey)) res.status(401).json({ error: 'a valid key is needed' });
    else next();
  });
  app.get('/v1/quotes', async (req, res) => {
    const codes = codesOf(req);
    if ((req.query.currency ?? 'USD') !== 'USD') throw new BadRequest('currency: USD only');
    const scenario = await disturbed(book, res, slowMs);
    if (isAnswered(scenario)) return;
    const currency = scenario === 'garbage-currency' ? 'EUR' : 'USD';
    res.json({ currency, unit: 'troy_ounce', market: book.market(), quotes: book.entries(codes) });
    book.countPoll(codes);
  });
  app.get('/v1/history', async (req, res) => {
    const codes = codesOf(req);
    const [from, to] = [dayOf(req, 'from'), dayOf(req, 'to')];
    if (from > to) throw new BadRequest('from: not after to');
    if (to - from > 400) throw new BadRequest('at most 400 days in one request');
    const scenario = await disturbed(book, res, slowMs);
    if (isAnswered(scenario)) return;
    const currency = scenario === 'garbage-currency' ? 'EUR' : 'USD';
    const history = codes.map((code) => ({ code, days: book.history(code, from, to) }));
    res.json({ currency, unit: 'troy_ounce', history });
  });
}

function mountControl(app: Express, book: QuoteBook) {
  app.get('/control/health', (_req, res) => void res.json({ ready: true }));
  app.get('/control/state', (_req, res) => {
    res.json({ now: new Date(book.nowMs()).toISOString(), market: book.market(), ...book.state });
  });
  app.post('/control/scenario', (req, res) => {
    book.order(readBody(scenarioSchema, req.body));
    answerControl(req, res, { ok: true });
  });
  app.post('/control/clock', (req, res) => {
    book.advance(readBody(clockSchema, req.body).advanceSeconds);
    answerControl(req, res, { now: new Date(book.nowMs()).toISOString() });
  });
  app.post('/control/set', (req, res) => {
    const { code, mid } = readBody(setSchema, req.body);
    book.pin(code, mid);
    answerControl(req, res, { ok: true });
  });
  app.get('/', (_req, res) => void res.type('html').send(renderQuotesPage(book)));
}

/** Starts the quote service's stand-in on loopback. */
export async function startQuotesFake(options: QuotesFakeOptions = {}): Promise<RunningFake> {
  const systemNowMs = options.systemNowMs ?? Date.now;
  const file = openStateFile(options.dataDir, 'quotes.json', () =>
    initialBookState(options.seed ?? 20, options.startedAtMs ?? systemNowMs()),
  );
  const book = new QuoteBook(file, systemNowMs);
  const app = express();
  app.use(express.json(), express.urlencoded({ extended: false }));
  mountService(app, book, options.apiKey, options.slowMs ?? 10_000);
  mountControl(app, book);
  app.use(answerErrors);
  return serveOnLoopback(app, options.port ?? 0);
}
