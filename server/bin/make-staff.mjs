import { runWithProduct } from './lib/run-with-product.mjs';

const [email, role, ...rest] = process.argv.slice(2);
await runWithProduct(
  'node server/bin/make-staff.mjs <e-mail> <member|desk|lab|admin>',
  email && role && rest.length === 0
    ? ({ runShown }) => runShown('server/bin/make-staff-run.ts', [email, role])
    : undefined,
  { needsAll: false },
);
