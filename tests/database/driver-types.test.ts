import { QueryTypes } from 'sequelize';
import { afterAll, describe, expect, it } from 'vitest';
import { sequelize } from '#server/database/connection.ts';
import { Deal } from '#server/models/index.ts';

afterAll(() => sequelize.close());

const select = (sql: string) => sequelize.query<Record<string, unknown>>(sql, { type: QueryTypes.SELECT });

describe('the driver', () => {
  it('answers DECIMAL as an exact string, also as a sum and beside a number', async () => {
    const [row] = await select(
      `SELECT CAST('123456789012.12345678' AS DECIMAL(20,8)) AS d,
              CAST('0.1000' AS DECIMAL(20,4)) AS small,
              SUM(CAST('123456789012.12345678' AS DECIMAL(20,8))) AS total,
              CAST('1.5' AS DECIMAL(4,2)) + 1 AS beside`,
    );
    expect(row).toEqual({
      d: '123456789012.12345678',
      small: '0.1000',
      total: '123456789012.12345678',
      beside: '2.50',
    });
  });

  it('answers a safe BIGINT and COUNT as numbers and throws on an unsafe one', async () => {
    const [row] = await select('SELECT CAST(412135 AS SIGNED) AS b, COUNT(*) AS c');
    expect(row).toEqual({ b: 412135, c: 1 });
    await expect(select('SELECT CAST(9007199254740993 AS SIGNED) AS b')).rejects.toThrow();
  });

  it('answers DATETIME(3) as a Date in UTC with its milliseconds', async () => {
    const [row] = await select("SELECT CAST('2026-12-01 14:02:03.456' AS DATETIME(3)) AS at");
    expect((row!.at as Date).toISOString()).toBe('2026-12-01T14:02:03.456Z');
  });

  it('gives money of a model as bigint', () => {
    const deal = Deal.build({ priceMinor: 412135n } as never);
    expect(deal.priceMinor).toBe(412135n);
    deal.setDataValue('priceMinor', 5 as never);
    expect(deal.priceMinor).toBe(5n);
  });
});

describe('the application’s database user', () => {
  it('cannot change or delete what is written once', async () => {
    for (const table of [
      'ledger_journals',
      'ledger_entries',
      'deal_events',
      'lot_events',
      'audit_entries',
      'deal_sheets',
    ]) {
      await expect(sequelize.query(`DELETE FROM ${table}`)).rejects.toMatchObject({
        original: { errno: 1142, code: 'ER_TABLEACCESS_DENIED_ERROR' },
      });
      await expect(sequelize.query(`UPDATE ${table} SET created_at = NOW(3)`)).rejects.toMatchObject({
        original: { errno: 1142 },
      });
    }
  });

  it('cannot make, change or drop a table', async () => {
    await expect(sequelize.query('CREATE TABLE mine (id INT PRIMARY KEY)')).rejects.toMatchObject({
      original: { errno: 1142 },
    });
    await expect(sequelize.query('ALTER TABLE lots ADD COLUMN mine INT')).rejects.toMatchObject({
      original: { errno: 1142 },
    });
    await expect(sequelize.query('DROP TABLE lots')).rejects.toMatchObject({ original: { errno: 1142 } });
  });
});
