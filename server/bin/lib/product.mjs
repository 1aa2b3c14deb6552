import { existsSync } from 'node:fs';
import path from 'node:path';
import { createChildren, logEnds, logTail } from './children.mjs';
import { forgetWithoutDatabase, hasDemo, makeDemoOnce } from './data-folder.mjs';
import { addresses, fakeProcesses, ownerEnvironment, productEnvironment } from './environment.mjs';
import { installDatabase, serverCommand, waitForDatabase, writeInitFile } from './mariadb.mjs';
import { inData, root } from './paths.mjs';
import { choosePorts } from './ports.mjs';
import { Halt, say } from './say.mjs';
import { loadSecrets } from './secrets.mjs';
import { waitForAnswer, waitForLife } from './wait.mjs';

const typescript = (entry) => [process.execPath, '--enable-source-maps', '--import', 'tsx', entry];
const portNames = ['product', 'database', 'payments', 'quotes', 'smtp', 'mailbox', 'carrier'];

/**
 * The product and all it stands on, started part by part: database, migrations, stand-ins, API, demo, jobs. `mode` is
 * `start` or `dev`; `onUnexpectedEnd` hears of a part that ended by itself.
 */
export async function createProduct({ mode, onUnexpectedEnd, onOutput }) {
  const secrets = loadSecrets();
  const ports = await choosePorts(mode === 'dev' ? [...portNames, 'pages'] : portNames);
  const urls = addresses(ports);
  const env = productEnvironment({ ports, secrets, mode });
  const ownerEnv = { ...env, ...ownerEnvironment({ ports, secrets }) };
  const children = createChildren({ onUnexpectedEnd });

  async function startDatabase() {
    const folder = inData('mariadb');
    if (installDatabase(folder).isNew) forgetWithoutDatabase();
    const initFile = path.join(folder, 'init.sql');
    writeInitFile(initFile, {
      ownerPassword: secrets.databaseOwnerPassword,
      appPassword: secrets.databaseAppPassword,
    });
    const child = children.start('database', serverCommand(folder, { port: ports.database, initFile }), {
      env: { ...process.env, TZ: 'UTC' },
    });
    await waitForDatabase(ports.database, { isAlive: () => !child.hasEnded, readLog: () => logTail(child) });
  }

  /** Runs one of the product's programs to its end. */
  async function runOnce(name, entry, args = []) {
    const child = children.start(name, [...typescript(entry), ...args], { env: ownerEnv });
    child.isExpectedToEnd = true;
    const { code, error } = await child.ended;
    await children.stop(child);
    if (code !== 0) {
      throw new Halt(
        `${name} did not work (${error?.message ?? `exit ${code}`}):\n${logEnds(child)}\n\nWhole log: ${child.logFile}`,
      );
    }
    return child;
  }

  async function startFakes() {
    const started = fakeProcesses({ ports, secrets }).map(({ name, entry, health, env: fakeEnv }) => ({
      health,
      child: children.start(name, typescript(entry), { env: fakeEnv }),
    }));
    await Promise.all(started.map(({ health, child }) => waitForAnswer(health, child)));
  }

  async function startApi() {
    const child = children.start('api', watched('server/index.ts'), { env, onOutput });
    await waitForAnswer(`${urls.api}/healthz`, child);
    return child;
  }

  async function startPages() {
    const vite = path.join(root, 'node_modules', 'vite', 'bin', 'vite.js');
    const command = [
      process.execPath,
      vite,
      '--port',
      String(ports.pages),
      '--strictPort',
      '--clearScreen=false',
    ];
    const child = children.start('pages', command, { env: { ...env, API_ORIGIN: urls.api } });
    await waitForAnswer(`http://127.0.0.1:${ports.pages}/`, child);
  }

  async function makeDemo() {
    const seeder = 'server/database/seeders/index.ts';
    if (hasDemo() || process.env.SCRUPLE_DEMO === 'no' || !existsSync(path.join(root, seeder))) return;
    say('Making the demo (once; this takes a little while) …');
    await makeDemoOnce(() => runOnce('seed', seeder));
  }

  async function startJobs(api) {
    const child = children.start('jobs', watched('jobs/index.ts'), {
      env,
      onOutput,
      canSend: mode !== 'dev',
    });
    await waitForLife(child);
    await waitForAnswer(`${urls.api}/readyz`, api);
  }

  function watched(entry) {
    const [node, ...args] = typescript(entry);
    return mode === 'dev' ? [node, '--watch', '--watch-preserve-output', ...args] : [node, ...args];
  }

  const migrate = () => runOnce('migrate', 'server/database/migrate.ts');

  async function startAll() {
    await startDatabase();
    await Promise.all([migrate(), startFakes()]);
    const api = await startApi();
    if (mode === 'dev') await startPages();
    await makeDemo();
    await startJobs(api);
  }

  return {
    ...children,
    env: ownerEnv,
    ports,
    urls,
    startDatabase,
    startFakes,
    startAll,
    migrate,
    makeDemo,
    startApi,
    runOnce,
  };
}
