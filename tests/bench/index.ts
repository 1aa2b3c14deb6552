import path from 'node:path';
import { freePort } from '#server/bin/lib/ports.mjs';
import { migrate } from '#server/database/migrate.ts';
import { startBenchDatabase } from './bench-database.ts';
import { bareBytes, benchBundle, buildClient } from './bundle-bench.ts';
import { benchEnvironment } from './bench-environment.ts';
import { runProcess } from './run-process.ts';

const root = path.resolve(import.meta.dirname, '../..');

/** `npm run bench -- ledger bundle` measures these alone. */
const asked = process.argv.slice(2);
const isAsked = (name: 'register' | 'ledger' | 'bundle') => asked.length === 0 || asked.includes(name);

const database = await startBenchDatabase();
const endings: (() => Promise<unknown>)[] = [database.stop];
try {
  const environment = await benchEnvironment(database);
  // Both builds come first and as for production: a builder takes over whatever NODE_ENV it finds.
  process.env.NODE_ENV = 'production';
  await buildClient(environment.CLIENT_DIST_DIR);
  const bare = await bareBytes(database.folder);
  Object.assign(process.env, environment);
  await migrate(environment.DATABASE_OWNER_URL, 'scruple_app');
  const productUrl = environment.PUBLIC_URL;
  const product = await runProcess(path.join(root, 'server/index.ts'), environment, `${productUrl}/healthz`);
  endings.unshift(product.stop);
  const floorPort = String(await freePort());
  const floorUrl = `http://127.0.0.1:${floorPort}`;
  const floor = await runProcess(
    path.join(import.meta.dirname, 'floor-server.ts'),
    { ...environment, FLOOR_PORT: floorPort },
    `${floorUrl}/healthz`,
  );
  endings.unshift(floor.stop);
  // Imported only now: the product reads its environment once, with its modules.
  await import('#server/models/index.ts');
  const { sequelize } = await import('#server/database/connection.ts');
  endings.unshift(() => sequelize.close());
  const { benchRegister } = await import('./register-bench.ts');
  if (isAsked('register')) await benchRegister(productUrl, floorUrl, database.port);
  const { benchLedger } = await import('./ledger-bench.ts');
  if (isAsked('ledger')) await benchLedger(environment.DATABASE_URL);
  if (isAsked('bundle')) await benchBundle(productUrl, bare);
} finally {
  for (const end of endings) await end();
}
