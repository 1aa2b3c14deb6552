import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync } from 'node:fs';
import path from 'node:path';
import { clientFolder, root } from './paths.mjs';
import { Halt, say } from './say.mjs';
import { runTool } from './tools.mjs';

const sources = ['client', 'shared', 'vite.config.ts', 'package-lock.json'];

/**
 * Builds the client into `folder` unless the page built there is newer than every source. What is served is replaced
 * only by a build that is whole.
 */
export async function ensureClient(folder = clientFolder) {
  const page = path.join(folder, 'index.html');
  const builtAt = existsSync(page) ? statSync(page).mtimeMs : 0;
  const newest = Math.max(...sources.map((source) => newestChange(path.join(root, source))));
  if (builtAt > newest) return;
  say('Building the client …');
  const beside = `${folder}.new`;
  rmSync(beside, { recursive: true, force: true });
  const vite = path.join(root, 'node_modules', 'vite', 'bin', 'vite.js');
  const args = ['build', '--logLevel', 'warn', '--outDir', beside, '--emptyOutDir'];
  const hasWorked = await runTool(process.execPath, [vite, ...args], {
    env: { ...process.env, NODE_ENV: 'production' },
  });
  if (!hasWorked) throw new Halt('The client could not be built (see above).');
  swapIn(beside, folder);
}

/** A folder that is not empty cannot be renamed over: the old one steps aside first. */
function swapIn(beside, folder) {
  const old = `${folder}.old`;
  rmSync(old, { recursive: true, force: true });
  mkdirSync(path.dirname(folder), { recursive: true });
  if (existsSync(folder)) renameSync(folder, old);
  renameSync(beside, folder);
  rmSync(old, { recursive: true, force: true });
}

/** Folders count too: removing a file changes nothing but its folder. */
function newestChange(place) {
  if (!existsSync(place)) return 0;
  const stats = statSync(place);
  if (!stats.isDirectory()) return stats.mtimeMs;
  return Math.max(stats.mtimeMs, ...readdirSync(place).map((name) => newestChange(path.join(place, name))));
}
