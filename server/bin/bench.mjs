import { existsSync } from 'node:fs';
import path from 'node:path';
import { root } from './lib/paths.mjs';
import { complain, Halt } from './lib/say.mjs';
import { ensureNodeModules } from './lib/packages.mjs';
import { runTool } from './lib/tools.mjs';

const bench = path.join(root, 'tests', 'bench', 'index.ts');
try {
  if (!existsSync(bench)) throw new Halt('There is no benchmark yet.');
  await ensureNodeModules();
  const hasWorked = await runTool(process.execPath, ['--import', 'tsx', bench, ...process.argv.slice(2)], {
    output: 'inherit',
  });
  process.exitCode = hasWorked ? 0 : 1;
} catch (error) {
  complain(error);
  process.exitCode = 1;
}
