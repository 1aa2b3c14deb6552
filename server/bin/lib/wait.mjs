import { setTimeout as sleep } from 'node:timers/promises';
import { Halt } from './say.mjs';
import { logTail } from './children.mjs';

/** Waits until an address answers 200; gives up when its process ended or after `patienceMs`. */
export async function waitForAnswer(url, child, patienceMs = 60_000) {
  const until = Date.now() + patienceMs;
  let last = 'no answer yet';
  while (!child.hasEnded && Date.now() < until) {
    try {
      const response = await fetch(url, { signal: AbortSignal.timeout(2000) });
      const text = await response.text();
      if (response.ok) return;
      last = `${response.status} ${text.slice(0, 300)}`;
    } catch (error) {
      last = error.cause?.code ?? error.message;
    }
    await sleep(60);
  }
  const why = child.hasEnded ? 'it ended' : `within ${patienceMs / 1000} s, last: ${last}`;
  throw new Halt(
    `${child.name} did not become ready (${why}).\n${logTail(child)}\n\nWhole log: ${child.logFile}`,
  );
}

/** Waits until a process without an address says that it is ready, or has lived `patienceMs` without ending. */
export async function waitForLife(child, patienceMs = 3000) {
  const said = new Promise((resolve) => child.process.once('message', resolve));
  await Promise.race([said, child.ended, sleep(patienceMs, undefined, { ref: false })]);
  if (child.hasEnded) {
    throw new Halt(`${child.name} ended at once.\n${logTail(child)}\n\nWhole log: ${child.logFile}`);
  }
}
