import { emptyDataFolder, hasDemo } from './lib/data-folder.mjs';
import { whoRuns } from './lib/single-run.mjs';
import { complain, Halt, say } from './lib/say.mjs';
import { runWithProduct } from './lib/run-with-product.mjs';

const commands = {
  migrate: ({ runShown }) => runShown('server/database/migrate.ts'),
  async seed(context) {
    if (hasDemo()) return say('The demo is there already. To make it anew: npm run db:reset');
    await context.makeDemo();
    if (!hasDemo()) throw new Halt('There is no demo to make.');
    say('The demo is made.');
  },
  async reset(context) {
    say('The database, the memory of the stand-ins, uploads and demo were removed and made anew.');
    await commands.seed(context);
  },
};

const name = process.argv[2];
try {
  if (name === 'reset' && (await whoRuns())) {
    throw new Halt('Scruple runs: stop it first, then npm run db:reset.');
  }
  await runWithProduct('npm run db:migrate | db:seed | db:reset', commands[name], {
    before: name === 'reset' ? emptyDataFolder : undefined,
    needsAll: name !== 'migrate',
  });
} catch (error) {
  complain(error);
  process.exitCode = 1;
}
