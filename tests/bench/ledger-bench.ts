import mariadb, { type Pool, type PoolConnection } from 'mariadb';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { accountIdOf, type AccountRef } from '#server/features/ledger/account-ref.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { buildDeal } from '#tests/factories/build-deal.ts';
import { buildRates } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { inTwo, printTable } from './timing.ts';

const CLIENTS = 8;
const POSTINGS_EACH = 40;
const AMOUNT = 100n;

type Post = (dealId: string, key: string) => Promise<void>;

const entriesOf = (dealId: string): { account: AccountRef; amountMinor: bigint }[] => [
  { account: { kind: 'provider' }, amountMinor: AMOUNT },
  { account: { kind: 'escrow', dealId }, amountMinor: -AMOUNT },
];

const throughService: Post = async (dealId, key) => {
  const order = {
    kind: 'funding',
    dealId,
    uniqueKey: key,
    memo: 'bench',
    entries: entriesOf(dealId),
  } as const;
  await withTransaction({ deals: [dealId] }, (unit) => postJournal(order, unit));
};

async function rawPosting(connection: PoolConnection, dealId: string, key: string): Promise<void> {
  const escrow = accountIdOf({ kind: 'escrow', dealId });
  const journal = newId();
  await connection.query('START TRANSACTION');
  await connection.query('SET timestamp = DEFAULT');
  await connection.query('SELECT id FROM deals WHERE id = ? FOR UPDATE', [dealId]);
  await connection.query('UPDATE deals SET lock_version = lock_version + 1 WHERE id = ?', [dealId]);
  const [{ now }] = await connection.query('SELECT NOW(3) AS now');
  await connection.query(
    `INSERT INTO ledger_journals (id, kind, deal_id, unique_key, memo, at, created_at)
     VALUES (?, 'funding', ?, ?, 'bench', ?, ?)`,
    [journal, dealId, key, now, now],
  );
  const [balance] = await connection.query(
    'SELECT amount_minor AS amount FROM ledger_balances WHERE account_id = ? FOR UPDATE',
    [escrow],
  );
  await connection.query(
    'UPDATE ledger_balances SET amount_minor = ?, lock_version = lock_version + 1, updated_at = ? WHERE account_id = ?',
    [(BigInt(balance.amount) - AMOUNT).toString(), now, escrow],
  );
  const values = entriesOf(dealId).map(({ account, amountMinor }) => [
    newId(),
    journal,
    accountIdOf(account),
    amountMinor.toString(),
    'USD',
    now,
  ]);
  await connection.query(
    `INSERT INTO ledger_entries (id, journal_id, account_id, amount_minor, currency, created_at)
     VALUES (?, ?, ?, ?, ?, ?), (?, ?, ?, ?, ?, ?)`,
    values.flat(),
  );
  await connection.query('COMMIT');
}

const throughDriver =
  (pool: Pool): Post =>
  async (dealId, key) => {
    const connection = await pool.getConnection();
    try {
      await rawPosting(connection, dealId, key);
    } finally {
      await connection.release();
    }
  };

/** Postings a second with all clients at once; each posting is a committed transaction. */
async function rate(post: Post, dealIds: readonly string[]): Promise<number> {
  const began = performance.now();
  await Promise.all(
    Array.from({ length: CLIENTS }, async (_, client) => {
      for (let count = 0; count < POSTINGS_EACH; count += 1) {
        await post(dealIds[client % dealIds.length]!, `bench:${newId()}`);
      }
    }),
  );
  return (CLIENTS * POSTINGS_EACH * 1000) / (performance.now() - began);
}

/** Ledger postings by eight clients: each on a deal of its own, and all on one. */
export async function benchLedger(databaseUrl: string): Promise<void> {
  const url = new URL(databaseUrl);
  const pool = mariadb.createPool({
    host: url.hostname,
    port: Number.parseInt(url.port, 10),
    user: url.username,
    password: url.password,
    database: url.pathname.slice(1),
    connectionLimit: CLIENTS,
    bigIntAsNumber: true,
  });
  try {
    await buildRates();
    const [seller, buyer] = [await buildMember({ canSell: true }), await buildMember()];
    const dealIds: string[] = [];
    for (let count = 0; count < CLIENTS; count += 1) {
      dealIds.push((await buildDeal({ seller, buyer })).id);
    }
    const rows: string[][] = [];
    for (const [name, ids] of [
      ['spread over 8 deals', dealIds],
      ['all on one deal', dealIds.slice(0, 1)],
    ] as const) {
      await rate(throughService, ids);
      await rate(throughDriver(pool), ids);
      const [ours, theirs] = [await rate(throughService, ids), await rate(throughDriver(pool), ids)];
      rows.push([name, inTwo(ours), inTwo(theirs), inTwo(theirs / ours)]);
    }
    printTable(
      `Ledger, ${CLIENTS} clients × ${POSTINGS_EACH} postings (committed postings a second)`,
      ['accounts', 'product', 'driver', 'driver ÷ product'],
      rows,
    );
  } finally {
    await pool.end();
  }
}
