import mariadb, { type Connection } from 'mariadb';

/** All it takes to make another database like a migrated one, read once so that a copy costs one round trip. */
export interface DatabaseBlueprint {
  source: string;
  tables: { name: string; createStatement: string; columns: string[] }[];
  grants: { user: string; table: string; verbs: string }[];
}

const application = 'scruple_app';
const hosts = ['localhost', '127.0.0.1'];

function connectAsRoot(port: number) {
  return mariadb.createConnection({ host: '127.0.0.1', port, user: 'root', multipleStatements: true });
}

/** Reads tables, columns that may be written, and what the application's user may do with each table. */
export async function readBlueprint(port: number, source: string): Promise<DatabaseBlueprint> {
  const connection = await connectAsRoot(port);
  try {
    await refuseWhatIsNotCopied(connection, source);
    const names: { name: string }[] = await connection.query(
      "SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ? AND table_type = 'BASE TABLE' ORDER BY 1",
      [source],
    );
    const tables = [];
    for (const { name } of names) {
      const [row] = await connection.query(`SHOW CREATE TABLE \`${source}\`.\`${name}\``);
      const columns: { name: string }[] = await connection.query(
        "SELECT column_name AS name FROM information_schema.columns WHERE table_schema = ? AND table_name = ? AND is_generated = 'NEVER' ORDER BY ordinal_position",
        [source, name],
      );
      tables.push({
        name,
        createStatement: row['Create Table'],
        columns: columns.map((column) => column.name),
      });
    }
    const grants = await connection.query(
      "SELECT grantee AS user, table_name AS `table`, GROUP_CONCAT(privilege_type) AS verbs FROM information_schema.table_privileges WHERE table_schema = ? AND grantee LIKE CONCAT('\\'', ?, '\\'@%') GROUP BY grantee, table_name",
      [source, application],
    );
    return { source, tables, grants: [...grants] };
  } finally {
    await connection.end();
  }
}

/** A copy without them would differ from production, so their first appearance must be noticed here. */
async function refuseWhatIsNotCopied(connection: Connection, source: string): Promise<void> {
  const found: { kind: string; count: string | number | bigint }[] = await connection.query(
    `SELECT 'triggers' AS kind, COUNT(*) AS count FROM information_schema.triggers WHERE trigger_schema = :source
     UNION ALL SELECT 'views', COUNT(*) FROM information_schema.views WHERE table_schema = :source
     UNION ALL SELECT 'routines', COUNT(*) FROM information_schema.routines WHERE routine_schema = :source
     UNION ALL SELECT 'column grants', COUNT(*) FROM information_schema.column_privileges WHERE table_schema = :source`.replaceAll(
      ':source',
      `'${source}'`,
    ),
  );
  const kinds = found.filter(({ count }) => BigInt(count) > 0n).map(({ kind }) => kind);
  if (kinds.length > 0) throw new Error(`The copy for tests does not know ${kinds.join(', ')}: teach it.`);
}

/** Makes a database like the blueprint, rows included, with the same rights for both users. */
export async function createFromBlueprint(
  port: number,
  blueprint: DatabaseBlueprint,
  name: string,
): Promise<void> {
  const statements = [
    `CREATE DATABASE \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`,
    `USE \`${name}\``,
    'SET foreign_key_checks = 0',
    ...blueprint.tables.map(({ createStatement }) => createStatement),
    ...blueprint.tables.map(({ name: table, columns }) => {
      const list = columns.map((column) => `\`${column}\``).join(', ');
      return `INSERT INTO \`${table}\` (${list}) SELECT ${list} FROM \`${blueprint.source}\`.\`${table}\``;
    }),
    ...hosts.map(
      (host) => `GRANT ALL PRIVILEGES ON \`${name}\`.* TO 'scruple_owner'@'${host}' WITH GRANT OPTION`,
    ),
    ...blueprint.grants.map(
      ({ user, table, verbs }) => `GRANT ${verbs} ON \`${name}\`.\`${table}\` TO ${user}`,
    ),
  ];
  const connection = await connectAsRoot(port);
  try {
    await connection.query(statements.join(';\n'));
  } finally {
    await connection.end();
  }
}

/** Removes such a database; connections that a test left open with a transaction make it fail soon instead of waiting. */
export async function dropDatabase(port: number, name: string): Promise<void> {
  const connection = await connectAsRoot(port);
  try {
    await connection.query(`SET lock_wait_timeout = 5; DROP DATABASE \`${name}\``);
  } finally {
    await connection.end();
  }
}
