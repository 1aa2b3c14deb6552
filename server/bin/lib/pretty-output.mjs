import { createWriteStream } from 'node:fs';

/** Shows what a child logs in readable colour beside keeping it in its log file. */
export function prettyOutput(child, logHandle) {
  const log = createWriteStream('', { fd: logHandle });
  const shown = import('pino-pretty').then(({ default: pretty }) =>
    pretty({ colorize: process.stdout.isTTY === true, ignore: 'pid,hostname', translateTime: 'HH:MM:ss.l' }),
  );
  let open = 2;
  for (const source of [child.stdout, child.stderr]) {
    source.pipe(log, { end: false });
    void shown.then((stream) => source.pipe(stream, { end: false }));
    source.once('end', () => {
      open -= 1;
      if (open === 0) log.end();
    });
  }
}
