import { QueryTypes, type Sequelize } from 'sequelize';

const WANTED: Readonly<Record<string, string>> = {
  innodb_flush_log_at_trx_commit: '1',
  binlog_format: 'ROW',
  innodb_autoinc_lock_mode: '2',
  innodb_snapshot_isolation: 'ON',
  time_zone: '+00:00',
};

/**
 * Refuses to start on a server whose settings could lose an acknowledged write or let two writers overwrite each other.
 * Test servers may relax the flush alone.
 */
export async function assertServerSettings(sequelize: Sequelize, allowRelaxedFlush: boolean): Promise<void> {
  const rows = await sequelize.query<Record<string, string | number>>(
    `SELECT ${Object.keys(WANTED)
      .map((name) => `CAST(@@${name} AS CHAR) AS ${name}`)
      .join(
        ', ',
      )}, @@sql_mode AS sql_mode, CAST(@@log_bin AS CHAR) AS log_bin, CAST(@@sync_binlog AS CHAR) AS sync_binlog`,
    { type: QueryTypes.SELECT },
  );
  const found = rows[0]!;
  const faults = Object.entries(WANTED)
    .filter(([name, wanted]) => String(found[name]) !== wanted)
    .filter(([name]) => !(allowRelaxedFlush && name === 'innodb_flush_log_at_trx_commit'))
    .map(([name, wanted]) => `${name} is ${String(found[name])}, wanted ${wanted}`);
  if (!String(found.sql_mode).includes('STRICT_TRANS_TABLES'))
    faults.push('sql_mode lacks STRICT_TRANS_TABLES');
  if (String(found.log_bin) === '1' && String(found.sync_binlog) !== '1')
    faults.push('sync_binlog must be 1 with the binary log on');
  if (faults.length > 0)
    throw new Error(`The database server's settings are refused:\n  ${faults.join('\n  ')}`);
}
