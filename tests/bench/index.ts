import path from 'node:path';
import { freePort } from '#server/bin/lib/ports.mjs';
import { migrate } from '#server/database/migrate.ts';
import { startBenchDatabase } from './bench-database.ts';
import { benchEnvironment } from './bench-environment.ts';
import { runProcess } from './run-process.ts';

const root = path.resolve(import.meta.dirname, '../..');

const database = await startBenchDatabase();
const endings: (() => Promise<unknown>)[] = [database.stop];
try {
  const environment = await benchEnvironment(database);
  Object.assign(process.env, environment);
  await migrate(environment.DATABASE_OWNER_URL, 'scruple_app');
  // The product reads its environment once, with its modules.
  const { buildClient, benchBundle } = await import('./bundle-bench.ts');
  await buildClient(environment.CLIENT_DIST_DIR);
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
  const { sequelize } = await import('#server/database/connection.ts');
  endings.unshift(() => sequelize.close());
  const { benchRegister } = await import('./register-bench.ts');
  await benchRegister(productUrl, floorUrl, database.port);
  const { benchLedger } = await import('./ledger-bench.ts');
  await benchLedger(environment.DATABASE_URL);
  await benchBundle(productUrl, database.folder);
} finally {
  for (const end of endings) await end();
}
