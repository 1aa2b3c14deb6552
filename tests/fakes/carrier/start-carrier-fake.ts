import { setTimeout as wait } from 'node:timers/promises';
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
import { openStateFile } from '../kit/state-file.ts';
import { renderCarrierPage } from './carrier-page.ts';
import { initialTrackersState, orders, Trackers } from './trackers.ts';

export type CarrierFakeOptions = {
  port?: number;
  dataDir?: string | undefined;
  /** Accepted bearer key; any key when left out. */
  apiKey?: string | undefined;
  /** Seconds from registration to delivery (120 when left out); null: only the buttons move a parcel. */
  deliverySeconds?: number | null;
  systemNowMs?: () => number;
  slowMs?: number;
};

const word = z.string().trim().min(1).max(60);
const registerSchema = z.object({ carrier: word, trackingNumber: word, reference: word });
const clockSchema = z.object({ advanceSeconds: z.coerce.number().int().min(-31_536_000).max(31_536_000) });
const faultSchema = z.object({ kind: z.enum(['none', 'down', 'slow', 'garbage']) });

function mountService(app: Express, trackers: Trackers, apiKey: string | undefined, slowMs: number) {
  app.use('/v1', async (req, res, next) => {
    const key = /^Bearer (\S+)$/.exec(req.headers.authorization ?? '')?.[1];
    const { fault } = trackers.state;
    if (!key || (apiKey && key !== apiKey)) res.status(401).json({ error: 'a valid key is needed' });
    else if (fault === 'down') res.status(503).json({ error: 'unavailable' });
    else if (fault === 'garbage') res.json({ id: 7, status: 'somewhere' });
    else {
      if (fault === 'slow') await wait(slowMs);
      next();
    }
  });
  app.post('/v1/trackers', (req, res) => {
    const { carrier, trackingNumber, reference } = readBody(registerSchema, req.body);
    const { tracker, isNew } = trackers.register(carrier, trackingNumber, reference);
    res.status(isNew ? 201 : 200).json(tracker);
  });
  app.get('/v1/trackers/:carrier/:number', (req, res) => {
    const tracker = trackers.find(req.params.carrier, req.params.number);
    if (!tracker) throw new BadRequest('no such tracker', 404);
    res.json(tracker);
  });
}

function mountControl(app: Express, trackers: Trackers) {
  app.get('/control/health', (_req, res) => void res.json({ ready: true }));
  app.get('/control/trackers', (_req, res) => void res.json({ trackers: trackers.newestFirst() }));
  app.post('/control/trackers/:number/:order', (req, res) => {
    const order = orders.find((each) => each === req.params.order);
    if (!order) throw new BadRequest(`one of ${orders.join(', ')}`, 404);
    answerControl(req, res, trackers.order(req.params.number, order));
  });
  app.post('/control/clock', (req, res) => {
    trackers.advance(readBody(clockSchema, req.body).advanceSeconds);
    answerControl(req, res, { now: new Date(trackers.nowMs()).toISOString() });
  });
  app.post('/control/faults', (req, res) => {
    trackers.setFault(readBody(faultSchema, req.body).kind);
    answerControl(req, res, { ok: true });
  });
  app.get('/', (_req, res) => void res.type('html').send(renderCarrierPage(trackers)));
}

/** Starts the parcel carrier's stand-in on loopback. */
export async function startCarrierFake(options: CarrierFakeOptions = {}): Promise<RunningFake> {
  const file = openStateFile(options.dataDir, 'carrier.json', initialTrackersState);
  const deliverySeconds = options.deliverySeconds === undefined ? 120 : options.deliverySeconds;
  const trackers = new Trackers(file, deliverySeconds, options.systemNowMs ?? Date.now);
  const app = express();
  app.use(express.json(), express.urlencoded({ extended: false }));
  mountService(app, trackers, options.apiKey, options.slowMs ?? 10_000);
  mountControl(app, trackers);
  app.use(answerErrors);
  return serveOnLoopback(app, options.port ?? 0);
}
