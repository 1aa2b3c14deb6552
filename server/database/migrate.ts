import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import mariadb, { type Connection } from 'mariadb';
import type { QueryInterface } from 'sequelize';
import { QueryTypes } from 'sequelize';
import { SequelizeStorage, Umzug, type MigrationFn } from 'umzug';
import { driverCode } from './driver-error.ts';
import { createSequelize } from './sequelize.ts';

export type Migration = MigrationFn<QueryInterface>;

/** Rows of these tables are written once; the application's user can neither change nor delete them. */
export const APPEND_ONLY_TABLES: readonly string[] = [
  'ledger_accounts',
  'ledger_journals',
  'ledger_entries',
  'deal_events',
  'lot_events',
  'deal_sheets',
  'audit_entries',
  'fee_schedules',
];
/** Tables of the migrator alone. */
const OWNER_TABLES = new Set(['schema_migrations']);

function connectionOptions(ownerUrl: string) {
  const url = new URL(ownerUrl);
  return {
    host: url.hostname,
    port: Number.parseInt(url.port, 10),
    user: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    database: url.pathname.slice(1),
  };
}

/** Where the application's user may come from; on another set-up the user exists for `%` alone. */
const APPLICATION_HOSTS = ['localhost', '127.0.0.1', '%'];
/** What the server answers to a grant for a user that it does not know at that host. */
const UNKNOWN_USER_CODES = new Set(['ER_PASSWORD_NO_MATCH', 'ER_CANT_CREATE_USER_WITH_GRANT']);

async function isUserKnown(connection: Connection, grantee: string): Promise<boolean> {
  try {
    await connection.query(`GRANT SELECT ON schema_migrations TO ${grantee}`);
    return true;
  } catch (error) {
    if (UNKNOWN_USER_CODES.has(driverCode(error) ?? '')) return false;
    throw error;
  }
}

/** Least privilege, table by table: grants add up in MariaDB, so a grant on the whole database could not be narrowed again. */
async function grantToApplication(ownerUrl: string, applicationUser: string): Promise<void> {
  const connection = await mariadb.createConnection(connectionOptions(ownerUrl));
  try {
    const tables: { name: string }[] = await connection.query(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE()',
    );
    let granted = 0;
    for (const host of APPLICATION_HOSTS) {
      const grantee = `'${applicationUser}'@'${host}'`;
      if (!(await isUserKnown(connection, grantee))) continue;
      granted += 1;
      for (const { name } of tables) {
        if (OWNER_TABLES.has(name)) continue;
        const verbs = APPEND_ONLY_TABLES.includes(name) ? 'SELECT, INSERT' : 'SELECT, INSERT, UPDATE, DELETE';
        await connection.query(`GRANT ${verbs} ON \`${name}\` TO ${grantee}`);
      }
    }
    if (granted === 0) throw new Error(`The application's database user ${applicationUser} does not exist`);
  } finally {
    await connection.end();
  }
}

/**
 * Runs what is missing, one runner at a time: the lock is the server's own, which is enough because migrations always go to
 * one node. Then gives the application's user its rights on every table.
 */
export async function migrate(ownerUrl: string, applicationUser: string | null): Promise<string[]> {
  const lock = await mariadb.createConnection(connectionOptions(ownerUrl));
  const sequelize = createSequelize(ownerUrl, 2);
  try {
    await lock.query("SELECT GET_LOCK('scruple-migrate', 60)");
    const umzug = createMigrator(sequelize);
    const done = await umzug.up();
    if (applicationUser !== null) await grantToApplication(ownerUrl, applicationUser);
    return done.map((migration) => migration.name);
  } finally {
    await sequelize.close();
    await lock.end();
  }
}

export function createMigrator(sequelize: ReturnType<typeof createSequelize>) {
  return new Umzug({
    migrations: {
      glob: ['*.ts', { cwd: fileURLToPath(new URL('./migrations', import.meta.url)) }],
      resolve: ({ name, path: file, context }) => {
        const load = async () =>
          (await import(pathToFileURL(file!).href)) as { up: Migration; down: Migration };
        return {
          name: path.parse(name).name,
          up: async () => (await load()).up({ name, path: file, context }),
          down: async () => (await load()).down({ name, path: file, context }),
        };
      },
    },
    context: sequelize.getQueryInterface(),
    storage: new SequelizeStorage({ sequelize, modelName: 'schema_migrations' }),
    logger: undefined,
  });
}

/** Used by the seed's reset: everything goes, in the reverse order of its making. */
export async function dropEverything(ownerUrl: string): Promise<void> {
  const sequelize = createSequelize(ownerUrl, 2);
  try {
    const tables = await sequelize.query<{ name: string }>(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE()',
      { type: QueryTypes.SELECT },
    );
    await sequelize.query('SET foreign_key_checks = 0');
    await sequelize.query(`DROP TABLE IF EXISTS ${tables.map(({ name }) => `\`${name}\``).join(', ')}`);
  } finally {
    await sequelize.close();
  }
}

const isMain = process.argv[1] === fileURLToPath(import.meta.url);
if (isMain) {
  const ownerUrl = process.env.DATABASE_OWNER_URL;
  const appUrl = process.env.DATABASE_URL;
  if (ownerUrl === undefined || appUrl === undefined) {
    throw new Error('DATABASE_OWNER_URL and DATABASE_URL must be set to migrate');
  }
  if (process.argv[2] === 'reset') await dropEverything(ownerUrl);
  const done = await migrate(ownerUrl, decodeURIComponent(new URL(appUrl).username));
  process.stdout.write(
    done.length === 0 ? 'The database is up to date.\n' : `Migrated: ${done.join(', ')}\n`,
  );
}
