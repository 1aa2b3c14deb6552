import { runWithProduct } from './lib/run-with-product.mjs';

const [name, ...args] = process.argv.slice(2);
await runWithProduct(
  'npm run job -- <name>',
  name ? ({ runShown }) => runShown('jobs/run.ts', [name, ...args]) : undefined,
);
