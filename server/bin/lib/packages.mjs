import path from 'node:path';
import { readJson } from './files.mjs';
import { root } from './paths.mjs';
import { Halt, say } from './say.mjs';
import { findProgram } from './programs.mjs';
import { runTool } from './tools.mjs';

/** Runs `npm ci` unless node_modules holds what the lock file asks for. */
export async function ensureNodeModules() {
  const wanted = readJson(path.join(root, 'package-lock.json'))?.packages;
  if (!wanted) throw new Halt('package-lock.json is missing or broken: take it from the repository again.');
  const reason = whyPackagesAreStale(
    wanted,
    readJson(path.join(root, 'node_modules', '.package-lock.json'))?.packages,
  );
  if (!reason) return;
  say(`Installing the packages of package-lock.json (${reason}) …`);
  if (!findProgram('npm')) throw new Halt('npm is missing: install Node 20 together with its npm.');
  const hasWorked = await runTool('npm', ['ci', '--include=dev', '--no-audit', '--no-fund']);
  if (!hasWorked) {
    throw new Halt('npm ci did not work (see above). Is the package registry reachable? Then start again.');
  }
}

/**
 * Compares what npm noted at the end of its last install with the lock file. By content and not by time: a checkout
 * touches files without changing them, and an install that was cut off leaves no note.
 */
export function whyPackagesAreStale(wanted, installed) {
  if (!installed) return 'nothing is installed yet';
  for (const [name, entry] of Object.entries(wanted)) {
    if (name === '' || entry.link) continue;
    const has = installed[name];
    if (!has && !entry.optional && !entry.peer) return `${name} is missing`;
    if (has && has.version !== entry.version) return `${name} is ${has.version}, not ${entry.version}`;
  }
  return undefined;
}
