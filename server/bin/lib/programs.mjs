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

/** Installs a Debian package unless all its programs are there; where that is not possible, says which command to run. */
export async function ensureDebianPackage(packageName, programs) {
  const missing = programs.filter((program) => !findProgram(program));
  if (missing.length === 0) return;
  const command = `apt-get update && apt-get install -y --no-install-recommends ${packageName}`;
  const isRoot = process.getuid?.() === 0;
  const byHand = `${missing.join(' and ')} missing. Run this, then start again:\n\n  ${isRoot ? '' : 'sudo '}sh -c '${command}'\n`;
  if (!findProgram('apt-get')) {
    throw new Halt(
      `${byHand}\nThis system has no apt-get: install the package ${packageName} in its own way.`,
    );
  }
  if (!isRoot && !findProgram('sudo')) throw new Halt(byHand);
  say(`Installing ${packageName} (${missing.join(', ')} missing) …`);
  const prefix = isRoot ? [] : ['sudo', ...(process.stdin.isTTY ? [] : ['-n'])];
  const [program, ...args] = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', 'sh', '-c', command];
  const hasWorked = await runTool(program, args, { input: 'inherit' });
  const stillMissing = programs.filter((name) => !findProgram(name));
  if (!hasWorked || stillMissing.length > 0) {
    throw new Halt(`Installing ${packageName} did not work. ${byHand}`);
  }
}

/** The database server and its installer. */
export function ensureMariadb() {
  return ensureDebianPackage('mariadb-server-core', ['mariadbd', 'mariadb-install-db']);
}

/** The browser of the tests. */
export function ensureChromium() {
  return ensureDebianPackage('chromium', ['chromium']);
}
