import { Sequelize, type Options } from 'sequelize';

/**
 * The full set is needed: by its defaults the dialect turns DECIMAL into binary floats, and with `bigNumberStrings` alone
 * `bulkCreate` returns concatenated ids. A test pins the types that come back.
 */
export const DRIVER_OPTIONS = {
  supportBigNumbers: false,
  bigNumberStrings: false,
  decimalAsNumber: false,
  bigIntAsNumber: true,
  insertIdAsNumber: true,
  checkNumberRange: true,
  connectTimeout: 5_000,
};

export function createSequelize(databaseUrl: string, poolMax = 12): Sequelize {
  const url = new URL(databaseUrl);
  const options: Options = {
    dialect: 'mariadb',
    host: url.hostname,
    port: url.port === '' ? 3306 : Number.parseInt(url.port, 10),
    database: url.pathname.slice(1),
    username: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    timezone: '+00:00',
    logging: false,
    pool: { max: poolMax, min: 0, idle: 10_000, acquire: 10_000 },
    dialectOptions: DRIVER_OPTIONS,
    define: { underscored: true, charset: 'utf8mb4', timestamps: true },
  };
  return new Sequelize(options);
}
