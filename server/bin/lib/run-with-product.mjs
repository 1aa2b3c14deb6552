import { makeDemoOnce } from './data-folder.mjs';
import { leaveAfter, watchForEnd } from './ending.mjs';
import { ownerEnvironment, productEnvironment, loadSettingsFile } from './environment.mjs';
import { readJson } from './files.mjs';
import { inData } from './paths.mjs';
import { prepareStart } from './prepare.mjs';
import { createProduct } from './product.mjs';
import { Halt, say } from './say.mjs';
import { loadSecrets } from './secrets.mjs';
import { whoRuns } from './single-run.mjs';
import { endTools, runTool } from './tools.mjs';

/**
 * Runs one command beside the product: beside the one that runs, else beside one started for this command and stopped
 * after it. `before` works on the data folder while nobody else can.
 */
export async function runWithProduct(usage, command, { before, needsAll = true } = {}) {
  let product;
  const { ended, fail, finish } = watchForEnd({ force: () => product?.forceAll() });

  async function run() {
    if (!command) throw new Halt(`Usage: ${usage}`);
    const other = await whoRuns();
    if (other) return command(besideRunning(other));
    await prepareStart({ describe: () => ({ pid: process.pid }), needsClient: false });
    before?.();
    product = await createProduct({
      mode: 'start',
      onUnexpectedEnd: (child) => fail(new Halt(`${child.name} ended unexpectedly; see ${child.logFile}`)),
    });
    say('Starting what this needs …');
    await product.startDatabase();
    await product.migrate();
    if (needsAll) {
      await product.startFakes();
      await product.startApi();
    }
    await command({
      makeDemo: product.makeDemo,
      runShown: (entry, args) => runShown(product.env, entry, args),
    });
  }

  run().then(finish, fail);
  await leaveAfter(ended, async () => {
    await endTools();
    await product?.stopAll();
  });
}

function besideRunning({ url }) {
  const ports = readJson(inData('ports.json'));
  if (!ports || !url) throw new Halt('Scruple is just starting: try again when it is ready.');
  const secrets = loadSecrets();
  loadSettingsFile();
  const env = {
    ...productEnvironment({ ports, secrets, mode: 'start' }),
    ...ownerEnvironment({ ports, secrets }),
  };
  const seeder = 'server/database/seeders/index.ts';
  return {
    makeDemo: () => makeDemoOnce(() => runShown(env, seeder)),
    runShown: (entry, args) => runShown(env, entry, args),
  };
}

async function runShown(env, entry, args = []) {
  const hasWorked = await runTool(process.execPath, ['--import', 'tsx', entry, ...args], {
    env,
    output: 'inherit',
  });
  if (!hasWorked) throw new Halt(`${entry} did not work.`);
}
