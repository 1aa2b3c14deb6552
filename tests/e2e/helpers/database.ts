import mariadb from 'mariadb';
import { inject } from 'vitest';

/** Asks the product's database, for what no page shows. */
export async function query<T>(sql: string, values: unknown[] = []): Promise<T[]> {
  const url = new URL(inject('productDatabaseUrl'));
  const connection = await mariadb.createConnection({
    host: url.hostname,
    port: Number.parseInt(url.port, 10),
    user: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    database: url.pathname.slice(1),
  });
  try {
    return (await connection.query(sql, values)) as T[];
  } finally {
    await connection.end();
  }
}

/** The code of the newest lot with this title. */
export async function lotCode(title: string): Promise<string> {
  const [row] = await query<{ code: string }>(
    'SELECT code FROM lots WHERE title = ? ORDER BY created_at DESC LIMIT 1',
    [title],
  );
  if (row === undefined) throw new Error(`There is no lot “${title}”`);
  return row.code;
}

/** The code of the deal over the lot with this title. */
export async function dealCode(title: string): Promise<string> {
  const [row] = await query<{ code: string }>(
    'SELECT d.code FROM deals d JOIN lots l ON l.id = d.lot_id WHERE l.title = ? ORDER BY d.created_at DESC LIMIT 1',
    [title],
  );
  if (row === undefined) throw new Error(`There is no deal over “${title}”`);
  return row.code;
}

/** The id of the certificate that was sent with a lot. */
export async function certificateId(title: string): Promise<string> {
  const [row] = await query<{ id: string }>(
    'SELECT c.id FROM certificates c JOIN lots l ON l.id = c.lot_id WHERE l.title = ? ORDER BY c.created_at DESC LIMIT 1',
    [title],
  );
  if (row === undefined) throw new Error(`There is no certificate of “${title}”`);
  return row.id;
}

/** The code of the draft that an account of the demo is writing; what stands in it is not in columns yet. */
export async function draftCode(who: string): Promise<string> {
  const [row] = await query<{ code: string }>(
    "SELECT l.code FROM lots l JOIN members m ON m.id = l.seller_id WHERE l.state = 'draft' AND m.email = ? LIMIT 1",
    [`${who}@scruple.example`],
  );
  if (row === undefined) throw new Error(`${who} has no draft`);
  return row.code;
}
