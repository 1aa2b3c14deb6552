import { env } from '#server/env.ts';
import { createSequelize } from './sequelize.ts';

/** The one pool of this process, as the application's own database user. */
export const sequelize = createSequelize(env.DATABASE_URL, env.DATABASE_POOL_MAX);
