import { accessSync, constants } from 'node:fs';
import path from 'node:path';
import { Halt, say } from './say.mjs';
import { runTool } from './tools.mjs';

/** The full path of a program, or undefined; servers live in sbin, which is not on everybody's PATH. */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? '').split(':'), '/usr/sbin', '/usr/bin', '/usr/local/bin'];
  return folders
    .filter(Boolean)
    .map((folder) => path.join(folder, name))
    .find(isExecutable);
}

function isExecutable(file) {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** Installs Debian packages unless all programs are there; where that is not possible, says which command to run. */
async function ensureDebianPackages(packages, programs) {
  const missing = programs.filter((program) => !findProgram(program));
  if (missing.length === 0) return;
  const packageNames = packages.join(' ');
  const command = `apt-get update && apt-get install -y --no-install-recommends ${packageNames}`;
  const isRoot = process.getuid?.() === 0;
  const byHand = `${missing.join(' and ')} missing. Run this, then start again:\n\n  ${isRoot ? '' : 'sudo '}sh -c '${command}'\n`;
  if (!findProgram('apt-get')) {
    throw new Halt(`${byHand}\nThis system has no apt-get: install ${packageNames} in its own way.`);
  }
  if (!isRoot && !findProgram('sudo')) throw new Halt(byHand);
  say(`Installing ${packageNames} (${missing.join(', ')} missing) …`);
  const prefix = isRoot ? [] : ['sudo', ...(process.stdin.isTTY ? [] : ['-n'])];
  const [program, ...args] = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', 'sh', '-c', command];
  const hasWorked = await runTool(program, args, { input: 'inherit' });
  const stillMissing = programs.filter((name) => !findProgram(name));
  if (!hasWorked || stillMissing.length > 0) {
    throw new Halt(`Installing ${packageNames} did not work. ${byHand}`);
  }
}

/** The database server and its installer, a script that cannot work without a small program of the client's package. */
export function ensureMariadb() {
  return ensureDebianPackages(
    ['mariadb-server-core', 'mariadb-client-core'],
    ['mariadbd', 'mariadb-install-db', 'my_print_defaults'],
  );
}

/** The browser of the tests. */
export function ensureChromium() {
  return ensureDebianPackages(['chromium'], ['chromium']);
}
