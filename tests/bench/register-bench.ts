import mariadb, { type Connection } from 'mariadb';
import { withTransaction } from '#server/database/transaction.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { buildRates, LOT_RATES } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { fillRegister } from '#tests/helpers/fill-register.ts';
import { inTwo, mediansInTurn, printTable } from './timing.ts';

const SIZES = [1_000, 20_000] as const;
const TURNS = { warmUp: 20, rounds: 80 };
const CASES = [
  { name: 'newest', query: 'sort=newest&limit=25', floor: 'newest' },
  { name: '% of melt, gold', query: 'sort=percent-of-melt&metal=Au&limit=25', floor: 'percent' },
  {
    name: 'fine content, certified silver to US',
    query: 'sort=fine-content&metal=Ag&grade=certified&destination=US&limit=25',
    floor: 'fine',
  },
] as const;

async function read(url: string): Promise<{ rows: { code: string }[] }> {
  const answer = await fetch(url);
  if (!answer.ok) throw new Error(`${url} answers ${answer.status}`);
  return (await answer.json()) as { rows: { code: string }[] };
}

/** Both must tell the same lots in the same order, or the comparison says nothing. */
async function assertSameRows(product: string, floor: string): Promise<void> {
  const [ours, theirs] = await Promise.all([read(product), read(floor)]);
  const codes = (rows: { code: string }[]) => rows.map(({ code }) => code).join();
  if (ours.rows.length !== 25 || codes(ours.rows) !== codes(theirs.rows)) {
    throw new Error(`${product} and ${floor} do not list the same lots`);
  }
}

/** Lots whose row a new quote of each metal writes. */
async function lotsWrittenByQuotes(root: Connection): Promise<number> {
  await root.query('CREATE TABLE lots_before AS SELECT * FROM lots');
  const at = new Date();
  for (const [metal, mid] of Object.entries(LOT_RATES)) {
    const reading = { metal: metal as keyof typeof LOT_RATES, mid: `${mid}1`, bid: null, ask: null, at };
    await withTransaction({}, (unit) => storeReading(reading, 'bench', true, unit));
  }
  const [row] = await root.query(
    `SELECT COUNT(*) AS written FROM lots l JOIN lots_before b USING (id)
      WHERE l.lock_version <> b.lock_version OR l.updated_at <> b.updated_at OR NOT (l.rank_price <=> b.rank_price)
         OR NOT (l.main_metal <=> b.main_metal) OR NOT (l.main_fine_grams <=> b.main_fine_grams)`,
  );
  await root.query('DROP TABLE lots_before');
  return row.written as number;
}

/** The first page of the register at two sizes, against a floor that lists the same lots. */
export async function benchRegister(
  productUrl: string,
  floorUrl: string,
  databasePort: number,
): Promise<void> {
  const root = await mariadb.createConnection({
    host: '127.0.0.1',
    port: databasePort,
    user: 'root',
    database: 'scruple',
    bigIntAsNumber: true,
  });
  try {
    await buildRates();
    const seller = await buildMember({ canSell: true });
    const times = new Map<string, number>();
    const rows: string[][] = [];
    for (const size of SIZES) {
      await root.query('DELETE FROM lot_assays');
      await root.query('DELETE FROM lots');
      await fillRegister(seller.id, size, LOT_RATES);
      for (const { name, query, floor } of CASES) {
        const product = `${productUrl}/api/v1/lots?${query}`;
        const least = `${floorUrl}/page/${floor}`;
        await assertSameRows(product, least);
        const [ours = 0, theirs = 0] = await mediansInTurn([() => read(product), () => read(least)], TURNS);
        times.set(`${name} ${size}`, ours);
        const own = ours / (times.get(`${name} ${SIZES[0]}`) ?? ours);
        rows.push([name, String(size), inTwo(ours), inTwo(theirs), inTwo(ours / theirs), inTwo(own)]);
      }
    }
    printTable(
      'Register, page 1 over HTTP (median ms)',
      ['listing', 'lots', 'product', 'floor', 'ratio', 'to own at 1,000'],
      rows,
    );
    const written = await lotsWrittenByQuotes(root);
    process.stdout.write(`A new quote of all four metals writes ${written} rows of 20,000 lots.\n`);
    if (written !== 0) process.exitCode = 1;
  } finally {
    await root.end();
  }
}
