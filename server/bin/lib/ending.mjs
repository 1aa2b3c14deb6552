import { complain, say } from './say.mjs';

/**
 * Gathers all reasons to end a run into one promise: the first signal, a part that died, an error nobody caught. A
 * second signal calls `force`. A terminal and npm both pass on one Ctrl-C, so signals close together count once.
 */
export function watchForEnd({ force }) {
  let resolveEnd;
  let signalledAt;
  const ended = new Promise((resolve) => (resolveEnd = resolve));
  for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(name, () => {
      const now = performance.now();
      if (signalledAt === undefined) {
        signalledAt = now;
        say('\nStopping …');
        resolveEnd({});
      } else if (now - signalledAt > 700) {
        force();
        say('Forced.');
        process.exit(130);
      }
    });
  }
  // A terminal that went away must not keep the run from stopping its parts.
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => {});
  const fail = (error) => resolveEnd({ error });
  process.on('uncaughtException', fail);
  process.on('unhandledRejection', fail);
  return { ended, fail, finish: () => resolveEnd({}) };
}

/** Waits for the end of a run, says why when it failed, cleans up and leaves. */
export async function leaveAfter(ended, cleanUp) {
  const { error } = await ended;
  if (error) complain(error);
  await cleanUp().catch(complain);
  process.exit(error ? 1 : 0);
}
