import { spawn } from 'node:child_process';
import { setTimeout as sleep } from 'node:timers/promises';

const READY_TRIES = 300;

/** Starts a TypeScript file as a process and waits until its address answers; `stop` waits until it is gone. */
export async function runProcess(file: string, environment: Record<string, string>, readyUrl: string) {
  const child = spawn(process.execPath, ['--import', 'tsx', file], {
    env: { ...process.env, ...environment },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const stop = async () => {
    child.kill('SIGTERM');
    if ((await Promise.race([ended, sleep(15_000, 'late', { ref: false })])) === 'late')
      child.kill('SIGKILL');
    await ended;
  };
  for (let tries = 0; tries < READY_TRIES && child.exitCode === null; tries += 1) {
    const isReady = await fetch(readyUrl).then(
      (answer) => answer.ok,
      () => false,
    );
    if (isReady) return { stop };
    await sleep(100);
  }
  await stop();
  throw new Error(`${file} did not answer at ${readyUrl}`);
}
