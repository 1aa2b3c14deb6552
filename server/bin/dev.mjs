import { prettyOutput } from './lib/pretty-output.mjs';
import { runProduct } from './lib/run-product.mjs';

await runProduct({ mode: 'dev', onOutput: prettyOutput });
