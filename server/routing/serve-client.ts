import { existsSync } from 'node:fs';
import path from 'node:path';
import express, { type Express } from 'express';
import { env } from '#server/env.ts';

/** Files of the built client; everything else that is not the API is the one page, whose router knows the address. */
export function serveClient(app: Express): void {
  const folder = path.resolve(env.CLIENT_DIST_DIR);
  const page = path.join(folder, 'index.html');
  if (!existsSync(page)) return;
  app.use(
    '/assets',
    express.static(path.join(folder, 'assets'), { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  app.use(express.static(folder, { index: false, maxAge: '5m' }));
  app.get(['/', '/*splat'], (_req, res) => {
    res.set('Cache-Control', 'no-cache').sendFile(page);
  });
}
