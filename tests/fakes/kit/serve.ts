import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Express, NextFunction, Request, Response } from 'express';
import { z } from 'zod';

export type RunningFake = { port: number; url: string; close: () => Promise<void> };

/** Listens on loopback; `close` also cuts open connections, so that a test never waits for a keep-alive socket. */
export function serveOnLoopback(app: Express, port: number): Promise<RunningFake> {
  const server = createServer(app);
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      const bound = (server.address() as AddressInfo).port;
      resolve({
        port: bound,
        url: `http://127.0.0.1:${bound}`,
        close: () =>
          new Promise((done, failed) => {
            server.close((error) => (error ? failed(error) : done()));
            server.closeAllConnections();
          }),
      });
    });
  });
}

/** Runs a fake as a process until SIGTERM or SIGINT. */
export async function runFakeProcess(
  name: string,
  start: () => Promise<{ url: string; close: () => Promise<void> }>,
) {
  const fake = await start();
  process.stdout.write(`${name} stand-in ready at ${fake.url}\n`);
  let isStopping = false;
  const stop = () => {
    if (isStopping) return;
    isStopping = true;
    fake.close().then(
      () => process.exit(0),
      (error: unknown) => {
        process.stderr.write(`${String(error)}\n`);
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

export function portFromEnvironment(name: string, fallback: number): number {
  const text = process.env[name];
  if (text === undefined || text === '') return fallback;
  if (!/^\d{1,5}$/.test(text)) throw new Error(`${name} must be a port number, got "${text}"`);
  return parseInt(text, 10);
}

/** A request a stand-in cannot serve; answered with its status and message. */
export class BadRequest extends Error {
  readonly status: number;
  constructor(message: string, status = 400) {
    super(message);
    this.status = status;
  }
}

/** Buttons post forms and want the page back; programs post JSON and want JSON back. */
export function answerControl(req: Request, res: Response, body: unknown, page = '/') {
  if (req.is('application/x-www-form-urlencoded')) res.redirect(303, page);
  else res.json(body);
}

/** Last middleware of every stand-in. */
export function answerErrors(error: unknown, _req: Request, res: Response, next: NextFunction) {
  if (res.headersSent) return next(error);
  const status = (error as { status?: unknown }).status;
  const message = error instanceof Error ? error.message : String(error);
  res.status(typeof status === 'number' ? status : 500).json({ error: message });
}

export function readBody<T>(schema: z.ZodType<T>, body: unknown): T {
  const result = schema.safeParse(body);
  if (!result.success) throw new BadRequest(z.prettifyError(result.error));
  return result.data;
}
