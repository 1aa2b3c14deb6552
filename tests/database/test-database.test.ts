import mariadb, { type Connection } from 'mariadb';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { APPEND_ONLY_TABLES } from '#server/database/migrate.ts';

function connect(address: string | undefined) {
  const url = new URL(address ?? '');
  return mariadb.createConnection({
    host: url.hostname,
    port: Number.parseInt(url.port, 10),
    user: url.username,
    password: url.password,
    database: url.pathname.slice(1),
  });
}

describe('the database that each test file gets', () => {
  let app: Connection;
  let owner: Connection;
  beforeAll(async () => {
    app = await connect(process.env.DATABASE_URL);
    owner = await connect(process.env.DATABASE_OWNER_URL);
  });
  afterAll(async () => {
    await app.end();
    await owner.end();
  });

  it('has every table of the migrated one, with its constraints', async () => {
    const [{ here }] = await owner.query(
      'SELECT COUNT(*) AS here FROM information_schema.table_constraints WHERE constraint_schema = DATABASE()',
    );
    const root = await mariadb.createConnection({
      host: '127.0.0.1',
      port: inject('databasePort'),
      user: 'root',
    });
    const [{ there }] = await root.query(
      "SELECT COUNT(*) AS there FROM information_schema.table_constraints WHERE constraint_schema = 'template'",
    );
    await root.end();
    expect(here).toBeGreaterThan(0n);
    expect(here).toBe(there);
  });

  it('holds the settings that money relies on', async () => {
    const [settings] = await app.query(
      `SELECT @@binlog_format AS binlogFormat, CAST(@@innodb_autoinc_lock_mode AS CHAR) AS autoinc,
              CAST(@@innodb_snapshot_isolation AS CHAR) AS snapshot, @@global.time_zone AS zone,
              CAST(@@innodb_lock_wait_timeout AS CHAR) AS lockWait, CAST(@@idle_transaction_timeout AS CHAR) AS idle,
              @@character_set_server AS charset, @@sql_mode AS mode`,
    );
    expect(settings).toMatchObject({
      binlogFormat: 'ROW',
      autoinc: '2',
      snapshot: 'ON',
      zone: '+00:00',
      lockWait: '5',
      idle: '60',
      charset: 'utf8mb4',
    });
    expect(settings.mode).toContain('STRICT_TRANS_TABLES');
  });

  it.each(APPEND_ONLY_TABLES)('lets the application neither change nor delete rows of %s', async (table) => {
    await expect(app.query(`DELETE FROM \`${table}\``)).rejects.toMatchObject({ errno: 1142 });
    await expect(app.query(`UPDATE \`${table}\` SET id = id`)).rejects.toMatchObject({ errno: 1142 });
    await expect(app.query(`SELECT COUNT(*) FROM \`${table}\``)).resolves.toHaveLength(1);
  });

  it('does not let the application change tables', async () => {
    await expect(app.query('CREATE TABLE stray (id INT PRIMARY KEY)')).rejects.toMatchObject({ errno: 1142 });
  });
});
