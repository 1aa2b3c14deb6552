import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ensureNodeModules } from './lib/packages.mjs';
import { checkMachine } from './lib/prepare.mjs';
import { ensureChromium, ensureMariadb } from './lib/programs.mjs';
import { complain, say } from './lib/say.mjs';
import { countVitest } from './lib/vitest-count.mjs';
import { ensureClient } from './lib/client-build.mjs';
import { endTools, runTool } from './lib/tools.mjs';

/** All checks, in the order in which a fault is cheapest to find; a failed one never hides the next. */
const totals = { passed: 0, failed: 0 };
const reports = mkdtempSync(path.join(os.tmpdir(), 'scruple-test-'));
const nodeTool = (file, ...args) => [process.execPath, [path.join('node_modules', file), ...args]];
let isInterrupted = false;

process.on('exit', () => rmSync(reports, { recursive: true, force: true }));
for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(name, () => {
    isInterrupted = true;
    void endTools();
  });
}

function count(title, { passed, failed }, startedAt) {
  totals.passed += passed;
  totals.failed += failed;
  say(
    `— ${title}: ${passed} passed, ${failed} failed (${((performance.now() - startedAt) / 1000).toFixed(1)} s)\n`,
  );
}

/** A check that is right or wrong as a whole counts as one test. */
async function check(title, [program, args]) {
  if (isInterrupted) return;
  say(`— ${title}`);
  const startedAt = performance.now();
  const hasWorked = await runTool(program, args, { output: 'inherit' });
  count(title, hasWorked ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 }, startedAt);
}

async function vitest(project) {
  if (isInterrupted) return;
  say(`— ${project} tests`);
  const startedAt = performance.now();
  const report = path.join(reports, `${project}.json`);
  const [program, args] = nodeTool('vitest/vitest.mjs', 'run', '--project', project);
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  const hasWorked = await runTool(program, [...args, ...reporters], { output: 'inherit' });
  count(`${project} tests`, countVitest(report, hasWorked), startedAt);
}

async function buildClient() {
  if (isInterrupted) return;
  const startedAt = performance.now();
  // The products of the tests serve this build and leave the one alone that may be in use.
  process.env.SCRUPLE_CLIENT_DIR = path.join(reports, 'client');
  try {
    await ensureClient(process.env.SCRUPLE_CLIENT_DIR);
    count('client build', { passed: 1, failed: 0 }, startedAt);
  } catch (error) {
    complain(error);
    count('client build', { passed: 0, failed: 1 }, startedAt);
  }
}

async function run() {
  checkMachine();
  await ensureNodeModules();
  await ensureMariadb();
  await ensureChromium();
  await check('format', nodeTool('prettier/bin/prettier.cjs', '--check', '--log-level', 'warn', '.'));
  await check('lint', nodeTool('eslint/bin/eslint.js', '.'));
  await check('types', nodeTool('typescript/bin/tsc', '-p', 'tsconfig.json'));
  for (const project of ['unit', 'client', 'server']) await vitest(project);
  await buildClient();
  await vitest('boot');
  await vitest('e2e');
}

try {
  await run();
} catch (error) {
  complain(error);
  totals.failed += 1;
}
if (isInterrupted) {
  complain('Interrupted: not all checks ran.');
  totals.failed += 1;
}
say(`${totals.passed} passed, ${totals.failed} failed`);
process.exitCode = totals.failed === 0 ? 0 : 1;
