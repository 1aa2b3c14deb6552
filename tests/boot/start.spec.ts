import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import mariadb from 'mariadb';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { readJson, writeJson } from '#server/bin/lib/files.mjs';
import { freePort } from '#server/bin/lib/ports.mjs';
import { identify } from '#server/bin/lib/processes.mjs';
import { startProduct, type RunningProduct } from '../setup/start-product.ts';
import { makeThrowAwayFolder } from '../setup/throw-away-folder.ts';

const startScript = fileURLToPath(new URL('../../server/bin/start.mjs', import.meta.url));
const portNames = ['product', 'database', 'payments', 'quotes', 'smtp', 'mailbox', 'carrier'];

interface Noted {
  children: { name: string; pid: number }[];
}

let folder: string;
let dataFolder: string;
let remove: () => void;
const running: RunningProduct[] = [];

beforeAll(async () => ({ folder, remove } = await makeThrowAwayFolder()));
afterAll(() => remove());
beforeEach(({ task }) => {
  dataFolder = path.join(folder, task.id, 'data');
  mkdirSync(dataFolder, { recursive: true });
});
afterEach(async () => {
  for (const product of running.splice(0)) await product.stop();
});

async function start(env: Record<string, string> = {}) {
  // One build for all that start here, unless the whole run brings one along.
  const SCRUPLE_CLIENT_DIR = process.env.SCRUPLE_CLIENT_DIR ?? path.join(folder, 'client');
  const product = await startProduct({
    dataFolder,
    env: { SCRUPLE_DEMO: 'no', SCRUPLE_CLIENT_DIR, ...env },
  });
  running.push(product);
  return product;
}

/** Processes that were started for the data folder of this test: each has it in its environment or command line. */
function processesOfFolder() {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map((name) => Number.parseInt(name, 10))
    .filter((pid) => pid !== process.pid && identify(pid) !== undefined)
    .filter((pid) => [`/proc/${pid}/environ`, `/proc/${pid}/cmdline`].some((file) => mentions(file)));
}

function mentions(file: string) {
  try {
    return readFileSync(file, 'utf8').includes(dataFolder);
  } catch {
    return false;
  }
}

function noted(name: string) {
  const { children } = readJson(path.join(dataFolder, 'run.json')) as Noted;
  const child = children.find((one) => one.name === name);
  if (!child) throw new Error(`${name} is not noted as running`);
  return child.pid;
}

async function query(product: RunningProduct, sql: string) {
  const url = new URL(product.ready.env.DATABASE_OWNER_URL);
  const connection = await mariadb.createConnection({
    host: url.hostname,
    port: Number.parseInt(url.port, 10),
    user: url.username,
    password: url.password,
    database: 'scruple',
  });
  try {
    return await connection.query(sql);
  } finally {
    await connection.end();
  }
}

async function keepOneRow(product: RunningProduct) {
  await query(product, 'CREATE TABLE IF NOT EXISTS kept (id INT PRIMARY KEY)');
  await query(product, 'INSERT INTO kept VALUES (7)');
}

const keptRows = (product: RunningProduct) => query(product, 'SELECT id FROM kept');

async function expectReady(product: RunningProduct) {
  for (const place of ['/healthz', '/readyz']) {
    const { status } = await fetch(`${product.ready.urls.product}${place}`);
    expect(status, place).toBe(200);
  }
}

describe('npm start', () => {
  it('stops everything in order on SIGTERM and is back within 10 s with its data', async () => {
    const first = await start();
    await expectReady(first);
    await keepOneRow(first);
    expect(processesOfFolder().length).toBeGreaterThanOrEqual(7);
    expect(await first.stop()).toBe(0);
    expect(processesOfFolder()).toEqual([]);

    const before = performance.now();
    const second = await start();
    expect(performance.now() - before).toBeLessThan(10_000);
    await expectReady(second);
    expect(await keptRows(second)).toEqual([{ id: 7 }]);
  });

  it('serves a page, answers unknown addresses with the page and 404, and builds in its own folder', async () => {
    const builtHere = path.join(dataFolder, 'client', 'index.html');
    const product = await start({ SCRUPLE_CLIENT_DIR: '' });
    const page = await fetch(`${product.ready.urls.product}/lots/S-2K7F4Q`);
    expect(page.status).toBe(200);
    expect(await page.text()).toBe(readFileSync(builtHere, 'utf8'));
    const unknown = await fetch(`${product.ready.urls.product}/nowhere/at/all`);
    expect(unknown.status).toBe(404);
    expect(await unknown.text()).toBe(readFileSync(builtHere, 'utf8'));
    expect(readdirSync(dataFolder).filter((name) => name.startsWith('client'))).toEqual(['client']);
  });

  it('leaves a run alone that is alive, and says where it is', async () => {
    const first = await start();
    const { status, stderr } = spawnSync(process.execPath, [startScript], {
      encoding: 'utf8',
      env: { ...process.env, NODE_ENV: '', SCRUPLE_DATA_DIR: dataFolder, SCRUPLE_PORTS: 'free' },
    });
    expect(status).toBe(1);
    expect(stderr).toContain('already runs');
    expect(stderr).toContain(first.ready.urls.product);
    await expectReady(first);
  });

  it('ends what a killed run left behind and keeps what was acknowledged', async () => {
    const first = await start();
    await keepOneRow(first);
    first.process.kill('SIGKILL');
    await sleep(200);
    const orphans = processesOfFolder();
    expect(orphans.length).toBeGreaterThanOrEqual(7);
    running.splice(0);

    const second = await start();
    expect(second.output()).toContain('An earlier run was killed');
    expect(orphans.filter((pid) => identify(pid))).toEqual([]);
    expect(await keptRows(second)).toEqual([{ id: 7 }]);
    await expectReady(second);
  });

  it('stops everything and shows the log when a part dies', async () => {
    const product = await start();
    process.kill(noted('api'), 'SIGKILL');
    const code = await new Promise((resolve) => product.process.once('close', resolve));
    running.splice(0);
    expect(code).toBe(1);
    expect(product.output()).toContain('api ended unexpectedly (ended by SIGKILL)');
    expect(processesOfFolder()).toEqual([]);
  });

  it('takes the next free port when one is taken, and says so', async () => {
    const ports: Record<string, number> = {};
    for (const name of portNames) ports[name] = await freePort();
    writeJson(path.join(dataFolder, 'ports.json'), ports);
    const squatter = net.createServer().listen(ports.product, '127.0.0.1');
    try {
      const product = await start({ SCRUPLE_PORTS: '', PORT: '', PUBLIC_URL: '' });
      expect(product.ready.ports.product).not.toBe(ports.product);
      expect(product.ready.ports.database).toBe(ports.database);
      expect(product.output()).toContain(`Port ${ports.product} (product) is taken`);
      await expectReady(product);
    } finally {
      squatter.close();
    }
  });

  it('remakes a data folder whose making was cut off, and trusts no stale pid file', async () => {
    const half = path.join(dataFolder, 'mariadb', 'data');
    mkdirSync(half, { recursive: true });
    writeFileSync(path.join(half, 'ibdata1'), 'half');
    writeFileSync(path.join(half, 'mariadbd.pid'), `${process.pid}\n`);
    writeJson(path.join(dataFolder, 'run.json'), {
      bootId: readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim(),
      children: [{ name: 'api', pid: process.pid, startedTicks: '1', command: 'node' }],
    });
    await expectReady(await start());
  });

  it('refuses to run stand-ins and demo in production', () => {
    const { status, stderr } = spawnSync(process.execPath, [startScript], {
      encoding: 'utf8',
      env: { ...process.env, NODE_ENV: 'production', SCRUPLE_DATA_DIR: dataFolder, SCRUPLE_PORTS: 'free' },
    });
    expect(status).toBe(1);
    expect(stderr).toContain('NODE_ENV is production');
    expect(readdirSync(dataFolder)).toEqual([]);
  });
});
