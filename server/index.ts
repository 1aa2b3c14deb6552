import { createServer } from 'node:http';
import { sequelize } from '#server/database/connection.ts';
import { assertServerSettings } from '#server/database/assert-settings.ts';
import { createApp } from '#server/app.ts';
import { env } from '#server/env.ts';
import { logger } from '#server/logger.ts';

const STOP_AFTER_MS = 10_000;

await assertServerSettings(sequelize, env.NODE_ENV === 'test');
const { app, close } = createApp();
const server = createServer(app);
server.headersTimeout = 20_000;
server.requestTimeout = 120_000;

/** Lets running requests finish, then the pool; a request that hangs does not hold the stop for ever. */
async function stop(signal: NodeJS.Signals): Promise<void> {
  logger.info({ signal }, 'stopping');
  const force = setTimeout(() => server.closeAllConnections(), STOP_AFTER_MS);
  await new Promise((resolve) => {
    server.close(resolve);
    server.closeIdleConnections();
  });
  clearTimeout(force);
  close();
  await sequelize.close();
  process.exit(0);
}

process.once('SIGTERM', (signal) => void stop(signal));
process.once('SIGINT', (signal) => void stop(signal));

server.listen(env.PORT, env.HOST, () => {
  logger.info({ host: env.HOST, port: env.PORT, publicUrl: env.PUBLIC_URL }, 'listening');
});
server.on('error', (error) => {
  logger.fatal({ err: error }, 'cannot listen');
  process.exit(1);
});
