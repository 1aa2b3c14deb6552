import { spawn } from 'node:child_process';
import { closeSync, mkdtempSync, openSync, readFileSync, rmSync } from 'node:fs';
import { randomBytes } from 'node:crypto';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { installDatabase, serverCommand, waitForDatabase, writeInitFile } from '#server/bin/lib/mariadb.mjs';
import { freePort } from '#server/bin/lib/ports.mjs';

export type BenchDatabase = {
  folder: string;
  port: number;
  passwords: { owner: string; app: string };
  stop: () => Promise<void>;
};

/** A MariaDB of its own on the disk, flushed as in production, in a folder that goes with it. */
export async function startBenchDatabase(): Promise<BenchDatabase> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'scruple-bench-'));
  const passwords = { owner: randomBytes(12).toString('hex'), app: randomBytes(12).toString('hex') };
  const place = path.join(folder, 'mariadb');
  const port = await freePort();
  installDatabase(place, { hasOpenRoot: true });
  const initFile = path.join(place, 'init.sql');
  writeInitFile(initFile, { ownerPassword: passwords.owner, appPassword: passwords.app });
  const [program, ...args] = serverCommand(place, { port, initFile, isDurable: true });
  const logFile = path.join(folder, 'mariadb.log');
  const log = openSync(logFile, 'a');
  const child = spawn(program, args, { stdio: ['ignore', log, log] });
  closeSync(log);
  const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const stop = async () => {
    child.kill('SIGTERM');
    if ((await Promise.race([ended, sleep(10_000, 'late', { ref: false })])) === 'late')
      child.kill('SIGKILL');
    await ended;
    rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
  };
  try {
    await waitForDatabase(port, {
      isAlive: () => child.exitCode === null,
      readLog: () => readFileSync(logFile, 'utf8'),
    });
  } catch (error) {
    await stop();
    throw error;
  }
  return { folder, port, passwords, stop };
}
