import { createHash } from 'node:crypto';
import net from 'node:net';
import { dataFolder } from './paths.mjs';
import { Halt } from './say.mjs';

/**
 * Only one run may own a data folder. The lock is a socket in the kernel's abstract namespace: taking it is atomic and
 * it ends with its process however that ends, so it can never be stale. Whoever finds it taken asks it who is there.
 */
export async function takeLock(describe) {
  const server = net.createServer((socket) => {
    socket.on('error', () => socket.destroy());
    socket.end(JSON.stringify(describe()));
  });
  await new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(lockName(), resolve);
  }).catch(async (error) => {
    if (error.code !== 'EADDRINUSE') throw error;
    const other = (await whoRuns()) ?? {};
    const where = other.url ? ` at ${other.url}` : '';
    throw new Halt(
      `Scruple already runs from this folder${where} (process ${other.pid ?? 'unknown'}).\n` +
        'Use that one, or stop it with Ctrl-C in its terminal' +
        `${other.pid ? ` or: kill ${other.pid}` : ''}`,
    );
  });
  server.unref();
  return { release: () => new Promise((resolve) => server.close(resolve)) };
}

/** What the run that owns the data folder says of itself; undefined when there is none. */
export function whoRuns() {
  return new Promise((resolve) => {
    let text = '';
    let isThere = false;
    const socket = net.connect(lockName());
    socket.setTimeout(2000, () => socket.destroy());
    socket.on('connect', () => (isThere = true));
    socket.on('data', (chunk) => (text += chunk));
    socket.on('error', () => resolve(undefined));
    socket.on('close', () => {
      try {
        resolve(JSON.parse(text));
      } catch {
        resolve(isThere ? {} : undefined);
      }
    });
  });
}

function lockName() {
  return `\0scruple-${createHash('sha256').update(dataFolder).digest('hex').slice(0, 32)}`;
}
