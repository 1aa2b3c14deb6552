import { parseEnv, type Env } from './parse-env.ts';

/** The environment of this process, read and checked once; a fault stops the boot and names itself. */
export const env: Env = parseEnv(process.env);
