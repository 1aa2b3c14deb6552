import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));

export interface ProductReady {
  urls: { product: string; api: string; mailbox: string; payments: string; quotes: string; carrier: string };
  ports: Record<string, number>;
  env: { DATABASE_OWNER_URL: string; DATABASE_URL: string; DEMO_ACCOUNTS_FILE: string };
}

export interface RunningProduct {
  process: ChildProcess;
  ready: ProductReady;
  /** Everything it has printed so far. */
  output: () => string;
  /** SIGTERM, then waits; answers with its exit code. */
  stop: () => Promise<number | null>;
}

/**
 * Starts `server/bin/start.mjs` with its data in `dataFolder` and waits until it says that it is ready. Fails with all
 * that it printed when it ends before.
 */
export async function startProduct(options: {
  dataFolder: string;
  env?: Record<string, string>;
  patienceMs?: number;
}): Promise<RunningProduct> {
  const { dataFolder, env = {}, patienceMs = 240_000 } = options;
  const { NODE_ENV: _ignored, ...inherited } = process.env;
  const child = spawn(process.execPath, [path.join(root, 'server/bin/start.mjs')], {
    cwd: root,
    env: { ...inherited, SCRUPLE_DATA_DIR: dataFolder, SCRUPLE_PORTS: 'free', ...env },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  let printed = '';
  child.stdout?.on('data', (chunk: Buffer) => (printed += chunk.toString()));
  child.stderr?.on('data', (chunk: Buffer) => (printed += chunk.toString()));
  const ended = new Promise<number | null>((resolve) => child.once('close', (code) => resolve(code)));
  const stop = async () => {
    child.kill('SIGTERM');
    return ended;
  };
  const ready = new Promise<ProductReady>((resolve) => {
    child.once('message', (message) => resolve(message as ProductReady));
  });
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<'late'>((resolve) => (timer = setTimeout(resolve, patienceMs, 'late')));
  const first = await Promise.race([ready, ended, late]);
  clearTimeout(timer);
  if (typeof first === 'object' && first !== null) {
    return { process: child, ready: first, output: () => printed, stop };
  }
  if (first === 'late') await stop();
  throw new Error(
    `The product did not start (${first === 'late' ? 'too slow' : `exit ${first}`}):\n${printed}`,
  );
}
