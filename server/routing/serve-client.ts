import { existsSync } from 'node:fs';
import path from 'node:path';
import express, { type Express, type RequestHandler } from 'express';
import { PAGE_PATHS } from '#shared/page-paths.ts';
import { env } from '#server/env.ts';

/** Files of the built client; everything else that is not the API is the one page, whose router knows the address. */
export function serveClient(app: Express): void {
  const folder = path.resolve(env.CLIENT_DIST_DIR);
  if (!existsSync(path.join(folder, 'index.html'))) return;
  app.use(
    '/assets',
    express.static(path.join(folder, 'assets'), { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  app.use(express.static(folder, { index: false, maxAge: '5m' }));
  app.get([...PAGE_PATHS], pageAs(200, folder));
  app.get('/*splat', pageAs(404, folder));
}

function pageAs(status: 200 | 404, folder: string): RequestHandler {
  return (_req, res) => {
    // Below a root the folder itself may lie in a hidden one, as the local data folder does.
    res.status(status).set('Cache-Control', 'no-cache').sendFile('index.html', { root: folder });
  };
}
