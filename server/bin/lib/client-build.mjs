import { existsSync, readdirSync, statSync } from 'node:fs';
import path from 'node:path';
import { root } from './paths.mjs';
import { Halt, say } from './say.mjs';
import { runTool } from './tools.mjs';

const sources = ['client', 'shared', 'vite.config.ts', 'package-lock.json'];

/** Builds the client unless the built page is newer than every source. */
export async function ensureClient() {
  const page = path.join(root, 'dist', 'client', 'index.html');
  const builtAt = existsSync(page) ? statSync(page).mtimeMs : 0;
  const newest = Math.max(...sources.map((source) => newestChange(path.join(root, source))));
  if (builtAt > newest) return;
  say('Building the client …');
  const vite = path.join(root, 'node_modules', 'vite', 'bin', 'vite.js');
  const hasWorked = await runTool(process.execPath, [vite, 'build', '--logLevel', 'warn'], {
    env: { ...process.env, NODE_ENV: 'production' },
  });
  if (!hasWorked) throw new Halt('The client could not be built (see above).');
}

/** Folders count too: removing a file changes nothing but its folder. */
function newestChange(place) {
  if (!existsSync(place)) return 0;
  const stats = statSync(place);
  if (!stats.isDirectory()) return stats.mtimeMs;
  return Math.max(stats.mtimeMs, ...readdirSync(place).map((name) => newestChange(path.join(place, name))));
}
