import { runProduct } from './lib/run-product.mjs';

await runProduct({ mode: 'start' });
