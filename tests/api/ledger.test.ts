import fc from 'fast-check';
import mariadb, { type Connection } from 'mariadb';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import '#server/models/index.ts';
import { ledgerBalancesCheck } from '#jobs/checks/ledger-balances.ts';
import { sequelize } from '#server/database/connection.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { accountIdOf, type AccountRef } from '#server/features/ledger/account-ref.ts';
import {
  accountStatement,
  accountSumMinor,
  dealLedger,
  heldMinor,
  trialBalance,
} from '#server/features/ledger/ledger-queries.ts';
import { openDealAccounts, openMemberAccounts } from '#server/features/ledger/open-accounts.ts';
import { postJournal, type JournalEntry, type JournalKind } from '#server/features/ledger/post-journal.ts';
import { reverseJournal } from '#server/features/ledger/reverse-journal.ts';
import { LedgerBalance } from '#server/models/ledger-balance.ts';
import { ledgerTable } from '#tests/helpers/ledger-table.ts';

afterAll(() => sequelize.close());

type Books = { dealId: string; memberId: string };

async function openBooks(): Promise<Books> {
  const books = { dealId: newId(), memberId: newId() };
  await withTransaction({}, async (unit) => {
    await openDealAccounts(books.dealId, unit);
    await openMemberAccounts(books.memberId, unit);
  });
  return books;
}

function post(dealId: string, kind: JournalKind, entries: JournalEntry[], uniqueKey: string = newId()) {
  return withTransaction({}, (unit) => postJournal({ kind, dealId, uniqueKey, memo: kind, entries }, unit));
}

const funding = ({ dealId }: Books, amountMinor: bigint): JournalEntry[] => [
  { account: { kind: 'provider' }, amountMinor },
  { account: { kind: 'escrow', dealId }, amountMinor: -amountMinor },
];
const settlement = ({ dealId, memberId }: Books, total: bigint, commission: bigint): JournalEntry[] => [
  { account: { kind: 'escrow', dealId }, amountMinor: total },
  { account: { kind: 'member_payable', memberId }, amountMinor: -(total - commission) },
  { account: { kind: 'commission' }, amountMinor: -commission },
];

async function balanceOf(account: AccountRef): Promise<bigint> {
  return (await LedgerBalance.findByPk(accountIdOf(account), { rejectOnEmpty: true })).amountMinor;
}

describe('posting a journal', () => {
  it('keeps every entry, the balances and what is held', async () => {
    const books = await openBooks();
    await post(books.dealId, 'funding', funding(books, 10_000n));
    expect(await heldMinor(books.dealId)).toBe(10_000n);
    await post(books.dealId, 'settlement', settlement(books, 10_000n, 400n));
    expect(await heldMinor(books.dealId)).toBe(0n);
    expect(await balanceOf({ kind: 'member_payable', memberId: books.memberId })).toBe(-9_600n);
    expect(ledgerTable(await dealLedger(books.dealId))).toBe(
      [
        'what        account              debit  credit',
        'funding     at the provider     100.00',
        '            held in escrow              100.00',
        'settlement  held in escrow      100.00',
        '            commission                    4.00',
        '            owed to the seller           96.00',
      ].join('\n'),
    );
  });

  it.each<[string, (books: Books) => JournalEntry[], RegExp]>([
    [
      'does not sum to zero',
      (books) => [...funding(books, 5n).slice(0, 1), ...funding(books, 6n).slice(1)],
      /sums to zero/,
    ],
    ['has one entry', (books) => funding(books, 5n).slice(0, 1), /two entries/],
    [
      'has an entry of nothing',
      (books) => [...funding(books, 5n), { account: { kind: 'commission' }, amountMinor: 0n }],
      /of nothing/,
    ],
    ['is larger than the largest amount', (books) => funding(books, 100_000_000_000n), /largest amount/],
    [
      'names an account twice',
      (books) => [...funding(books, 5n), ...funding(books, 5n)],
      /each account once/,
    ],
  ])('refuses a journal that %s, and writes nothing', async (_, entriesOf, message) => {
    const books = await openBooks();
    await expect(post(books.dealId, 'funding', entriesOf(books))).rejects.toThrow(message);
    expect(await dealLedger(books.dealId)).toEqual([]);
  });

  it('refuses an account that is not open', async () => {
    const books = { dealId: newId(), memberId: newId() };
    await expect(post(books.dealId, 'funding', funding(books, 5n))).rejects.toThrow(/not open/);
  });

  it('books a key once, also when twenty try at the same time', async () => {
    const books = await openBooks();
    const results = await Promise.allSettled(
      Array.from({ length: 20 }, () =>
        post(books.dealId, 'funding', funding(books, 700n), `funding:${books.dealId}`),
      ),
    );
    expect(results.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    const refusals = results.filter((result) => result.status === 'rejected');
    for (const { reason } of refusals) expect(reason).toMatchObject({ code: 'illegal-transition' });
    expect(await heldMinor(books.dealId)).toBe(700n);
  });

  it('never lets escrow give what it does not hold, also in a race of two releases', async () => {
    const books = await openBooks();
    await post(books.dealId, 'funding', funding(books, 1_000n));
    const results = await Promise.allSettled([
      post(books.dealId, 'settlement', settlement(books, 1_000n, 40n)),
      post(books.dealId, 'settlement', settlement(books, 1_000n, 40n)),
    ]);
    const refusals = results.filter((result) => result.status === 'rejected');
    expect(refusals).toHaveLength(1);
    expect(refusals[0]!.reason).toMatchObject({ code: 'deal-not-funded' });
    expect(await heldMinor(books.dealId)).toBe(0n);
  });

  it('opens the same accounts once, also when ten do it at the same time', async () => {
    const memberId = newId();
    await Promise.all(
      Array.from({ length: 10 }, () => withTransaction({}, (unit) => openMemberAccounts(memberId, unit))),
    );
    expect(await balanceOf({ kind: 'member_connected', memberId })).toBe(0n);
  });

  it('states an account with its balance after each entry', async () => {
    const books = await openBooks();
    const escrow = { kind: 'escrow', dealId: books.dealId } as const;
    await post(books.dealId, 'funding', funding(books, 300n));
    await post(books.dealId, 'settlement', settlement(books, 200n, 10n));
    const statement = await accountStatement(escrow);
    expect(statement.map(({ balanceMinor }) => balanceMinor)).toEqual([-100n, -300n]);
    expect(await accountSumMinor(escrow)).toBe(-100n);
  });
});

describe('reversing a journal', () => {
  it('turns every sign in a new journal and leaves the first', async () => {
    const books = await openBooks();
    await post(books.dealId, 'funding', funding(books, 900n), `f:${books.dealId}`);
    await withTransaction({}, (unit) =>
      reverseJournal({ uniqueKey: `f:${books.dealId}`, memo: 'taken back' }, unit),
    );
    expect(await heldMinor(books.dealId)).toBe(0n);
    expect((await dealLedger(books.dealId)).map(({ kind, amountMinor }) => [kind, amountMinor])).toEqual([
      ['funding', 900n],
      ['funding', -900n],
      ['reversal', 900n],
      ['reversal', -900n],
    ]);
  });

  it('happens once, also when two try at the same time', async () => {
    const books = await openBooks();
    await post(books.dealId, 'funding', funding(books, 900n), `f:${books.dealId}`);
    await post(books.dealId, 'funding', funding(books, 900n));
    const reverse = () =>
      withTransaction({}, (unit) => reverseJournal({ uniqueKey: `f:${books.dealId}`, memo: 'back' }, unit));
    const results = await Promise.allSettled([reverse(), reverse()]);
    expect(results.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect(await heldMinor(books.dealId)).toBe(900n);
  });
});

describe('any sequence of journals', () => {
  it('keeps the ledger at zero, and every balance the sum of its entries', async () => {
    const step = fc.record({
      from: fc.nat({ max: 4 }),
      to: fc.nat({ max: 4 }),
      amount: fc.bigInt({ min: 1n, max: 10_000_000n }),
      third: fc.option(fc.bigInt({ min: 1n, max: 1_000n }), { nil: null }),
      isReversed: fc.boolean(),
    });
    await fc.assert(
      fc.asyncProperty(fc.array(step, { minLength: 1, maxLength: 12 }), async (steps) => {
        const { memberId, dealId } = await openBooks();
        const accounts: AccountRef[] = [
          { kind: 'provider' },
          { kind: 'escrow', dealId },
          { kind: 'member_payable', memberId },
          { kind: 'member_connected', memberId },
          { kind: 'provider_fees' },
        ];
        for (const { from, to, amount, third, isReversed } of steps) {
          const rest = third ?? 0n;
          const entries = [
            { account: accounts[from]!, amountMinor: -amount - rest },
            { account: accounts[to]!, amountMinor: amount },
            { account: { kind: 'commission' } as const, amountMinor: rest },
          ].filter(({ amountMinor }) => amountMinor !== 0n);
          const uniqueKey = newId();
          const isPosted = await post(dealId, 'settlement', entries, uniqueKey).then(
            () => true,
            (error: Error) => {
              expect(error.message).toMatch(/each account once|Escrow does not hold/);
              return false;
            },
          );
          if (isPosted && isReversed) {
            await withTransaction({}, (unit) => reverseJournal({ uniqueKey, memo: 'back' }, unit)).catch(
              (error: unknown) => expect(error).toMatchObject({ code: 'deal-not-funded' }),
            );
          }
        }
        expect(await ledgerBalancesCheck.find()).toEqual([]);
        expect(await heldMinor(dealId)).toBeGreaterThanOrEqual(0n);
        const total = (await trialBalance()).reduce((sum, row) => sum + row.amountMinor, 0n);
        expect(total).toBe(0n);
      }),
      { numRuns: 25 },
    );
  });
});

describe('a reader beside many writers', () => {
  it('sees the whole ledger at zero in every snapshot, and no escrow overdrawn', async () => {
    const books = await Promise.all(Array.from({ length: 6 }, openBooks));
    let isWriting = true;
    const write = async (own: Books) => {
      for (let turn = 0; turn < 8; turn += 1) {
        const other = books[(books.indexOf(own) + turn) % books.length]!;
        await post(own.dealId, 'funding', funding(own, 1_000n));
        const entries = settlement({ dealId: own.dealId, memberId: other.memberId }, 1_000n, 40n);
        await post(own.dealId, 'settlement', entries);
      }
    };
    const writers = Promise.all(books.map(write)).finally(() => {
      isWriting = false;
    });
    let reads = 0;
    while (isWriting) {
      const total = (await trialBalance()).reduce((sum, row) => sum + row.amountMinor, 0n);
      expect(total).toBe(0n);
      reads += 1;
    }
    await writers;
    expect(reads).toBeGreaterThan(5);
    expect(await ledgerBalancesCheck.find()).toEqual([]);
    for (const { dealId } of books) expect(await heldMinor(dealId)).toBe(0n);
  });
});

describe('what is written once', () => {
  let app: Connection;
  beforeAll(async () => {
    const url = new URL(process.env.DATABASE_URL ?? '');
    app = await mariadb.createConnection({
      host: url.hostname,
      port: Number.parseInt(url.port, 10),
      user: url.username,
      password: url.password,
      database: url.pathname.slice(1),
    });
  });
  afterAll(() => app.end());

  it.each(['ledger_accounts', 'ledger_journals', 'ledger_entries'])(
    "can be neither changed nor removed by the application's user: %s",
    async (table) => {
      const refusal = { code: 'ER_TABLEACCESS_DENIED_ERROR', errno: 1142 };
      await expect(app.query(`UPDATE ${table} SET created_at = NOW(3)`)).rejects.toMatchObject(refusal);
      await expect(app.query(`DELETE FROM ${table}`)).rejects.toMatchObject(refusal);
    },
  );

  it('is held by the table itself: no entry of nothing, no other currency, no overdrawn escrow', async () => {
    const books = await openBooks();
    const journalId = await post(books.dealId, 'funding', funding(books, 50n));
    const refusal = { errno: 4025 };
    const insert = (amount: number, currency: string) =>
      app.query('INSERT INTO ledger_entries VALUES (?, ?, ?, ?, ?, NOW(3))', [
        newId(),
        journalId,
        accountIdOf({ kind: 'commission' }),
        amount,
        currency,
      ]);
    await expect(insert(0, 'USD')).rejects.toMatchObject(refusal);
    await expect(insert(5, 'EUR')).rejects.toMatchObject(refusal);
    await expect(
      app.query('UPDATE ledger_balances SET amount_minor = 1 WHERE account_id = ?', [
        accountIdOf({ kind: 'escrow', dealId: books.dealId }),
      ]),
    ).rejects.toMatchObject(refusal);
  });

  it('is found by the check when a row is changed behind our back', async () => {
    const books = await openBooks();
    await post(books.dealId, 'funding', funding(books, 50n));
    const accountId = accountIdOf({ kind: 'escrow', dealId: books.dealId });
    await app.query('UPDATE ledger_balances SET amount_minor = -49 WHERE account_id = ?', [accountId]);
    expect(await ledgerBalancesCheck.find()).toEqual([
      `balance of account ${accountId} is -49, its entries sum to -50`,
    ]);
    await app.query('UPDATE ledger_balances SET amount_minor = -50 WHERE account_id = ?', [accountId]);
    expect(await ledgerBalancesCheck.find()).toEqual([]);
  });
});
