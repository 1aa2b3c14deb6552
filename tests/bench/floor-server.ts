import express from 'express';
import mariadb from 'mariadb';

/** The least that can answer a page of lots: Express, the driver, and the best statement that we know how to write. */
const COLUMNS = `id, code, title, form, region, gross_value, gross_unit, gross_grams, price_minor, shipping_minor,
  destinations, evidence_grade, assay_version, main_metal, main_fineness_permille, main_fine_grams, rank_price,
  opened_at, closes_at`;
const PAGES: Readonly<Record<string, string>> = {
  newest: `state = 'open' ORDER BY opened_at DESC, id DESC`,
  percent: `state = 'open' AND main_metal = 'Au' AND rank_price IS NOT NULL ORDER BY rank_price, id`,
  fine: `state = 'open' AND main_metal = 'Ag' AND evidence_grade = 'certified'
         AND JSON_CONTAINS(destinations, '"US"') ORDER BY main_fine_grams DESC, id DESC`,
};

const url = new URL(process.env.DATABASE_URL ?? '');
const pool = mariadb.createPool({
  host: url.hostname,
  port: Number.parseInt(url.port, 10),
  user: url.username,
  password: url.password,
  database: url.pathname.slice(1),
  connectionLimit: 8,
  bigIntAsNumber: true,
});

const app = express();
app.get('/healthz', (_req, res) => void res.json({ isUp: true }));
app.get('/page/:name', async (req, res) => {
  const where = PAGES[req.params.name];
  if (where === undefined) return void res.status(404).end();
  const rows: { id: string }[] = await pool.query(`SELECT ${COLUMNS} FROM lots WHERE ${where} LIMIT 26`);
  const ids = rows.slice(0, 25).map(({ id }) => id);
  const [assays, photos] = await Promise.all([
    pool.query('SELECT * FROM lot_assays WHERE lot_id IN (?)', [ids]),
    pool.query('SELECT id, lot_id, position FROM lot_photos WHERE lot_id IN (?)', [ids]),
  ]);
  res.json({ rows: rows.slice(0, 25), assays, photos, hasMore: rows.length > 25 });
});
const server = app.listen(Number.parseInt(process.env.FLOOR_PORT ?? '', 10), '127.0.0.1');
process.once('SIGTERM', () => {
  server.closeAllConnections();
  server.close(() => void pool.end().then(() => process.exit(0)));
});
