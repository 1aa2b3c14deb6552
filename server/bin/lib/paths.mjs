import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of the checkout. */
export const root = fileURLToPath(new URL('../../..', import.meta.url));

/** Where everything that a start keeps lies; tests point it at a throw-away folder. */
export const dataFolder = path.resolve(root, process.env.SCRUPLE_DATA_DIR || '.data');

/** A path inside the data folder. */
export function inData(...parts) {
  return path.join(dataFolder, ...parts);
}

/** Where the start puts the client that it serves; tests share one among their products. */
export const clientFolder = path.resolve(root, process.env.SCRUPLE_CLIENT_DIR || inData('client'));
