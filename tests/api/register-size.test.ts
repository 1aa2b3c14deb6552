import { QueryTypes } from 'sequelize';
import { beforeAll, describe, expect, it } from 'vitest';
import { registerAnswer, type RegisterAnswer } from '#shared/schemas/lots.ts';
import { sequelize } from '#server/database/connection.ts';
import { buildRates, LOT_RATES } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { fillRegister } from '#tests/helpers/fill-register.ts';
import { startTestApp, type TestApp } from '#tests/helpers/test-app.ts';

const SIZE = 10_000;
let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
  await buildRates();
  const seller = await buildMember({ canSell: true });
  await fillRegister(seller.id, SIZE, LOT_RATES);
}, 60_000);

async function list(query: string): Promise<RegisterAnswer> {
  const answer = await fetch(`${app.url}/api/v1/lots?${query}`);
  expect(answer.status).toBe(200);
  return registerAnswer.parse(await answer.json());
}

/** The order of a whole listing, by a plain statement that knows nothing of indexes, streams or cursors. */
const ORDERS = {
  newest: 'opened_at DESC, id DESC',
  'fine-content': 'main_fine_grams DESC, id DESC',
  'percent-of-melt': `rank_price IS NULL, CAST(rank_price AS DECIMAL(50,20)) / CASE main_metal
    WHEN 'Au' THEN ${LOT_RATES.Au} WHEN 'Ag' THEN ${LOT_RATES.Ag} WHEN 'Pt' THEN ${LOT_RATES.Pt}
    ELSE ${LOT_RATES.Pd} END, id`,
} as const;

async function expectedCodes(sort: keyof typeof ORDERS, where: string, limit: number): Promise<string[]> {
  const rows = await sequelize.query<{ code: string }>(
    `SELECT code FROM lots WHERE state = 'open' AND ${where} ORDER BY ${ORDERS[sort]} LIMIT ${limit}`,
    { type: QueryTypes.SELECT },
  );
  return rows.map(({ code }) => code);
}

async function walk(query: string, pagesMax: number): Promise<string[]> {
  const seen: string[] = [];
  let cursor: string | null = null;
  for (let page = 0; page < pagesMax; page += 1) {
    const answer: RegisterAnswer = await list(cursor === null ? query : `${query}&cursor=${cursor}`);
    seen.push(...answer.rows.map(({ code }) => code));
    cursor = answer.nextCursor;
    if (cursor === null) break;
  }
  return seen;
}

describe('a register of 10,000 lots', () => {
  it.each(Object.keys(ORDERS) as (keyof typeof ORDERS)[])(
    'pages by %s without a gap or a repeat, ties included',
    async (sort) => {
      const walked = await walk(`sort=${sort}&limit=50`, 12);
      expect(walked).toEqual(await expectedCodes(sort, 'TRUE', 600));
    },
  );

  it('pages to the very end, where the lots stand that cannot be ranked', async () => {
    const walked = await walk('sort=percent-of-melt&limit=50&metal=Pd', 30);
    expect(walked).toEqual(await expectedCodes('percent-of-melt', "main_metal = 'Pd'", 2000));
    expect(walked).toHaveLength(1000);
  });

  it('counts up to a thousand and says that there are more', async () => {
    expect(await list('limit=1')).toMatchObject({ count: 1000, isCountCapped: true });
    expect(await list('limit=1&metal=Pd')).toMatchObject({ count: 1000, isCountCapped: false });
    const filtered = await list('limit=1&metal=Pd&destination=CA');
    expect(filtered.isCountCapped).toBe(false);
    expect(filtered.count).toBeGreaterThan(300);
  });
});

type Plan = { table: string; type: string; key: string | null; r_rows: string | null; Extra: string };

/** Runs a request while listening to its statements, then has the server run those on lots again and tell how. */
async function plansOf(query: string): Promise<Plan[]> {
  const statements: string[] = [];
  const { options } = sequelize as unknown as { options: { logging: false | ((text: string) => void) } };
  options.logging = (text) => void statements.push(text.replace(/^Executing \([^)]*\): /, ''));
  try {
    await list(query);
  } finally {
    options.logging = false;
  }
  const paging = statements.filter((text) => text.startsWith('SELECT lots.id, lots.main_metal'));
  expect(paging.length).toBeGreaterThan(0);
  const plans = await Promise.all(
    paging.map((text) => sequelize.query<Plan>(`ANALYZE ${text}`, { type: QueryTypes.SELECT })),
  );
  return plans.flat();
}

describe('how a page is found', () => {
  it.each([
    ['newest', 'lots_newest'],
    ['fine-content', 'lots_fine'],
    ['percent-of-melt', 'lots_rank'],
  ])('sorts by %s along an index, reading little more than the page', async (sort, key) => {
    let nextCursor: string | null = null;
    for (let page = 0; page < 20; page += 1) {
      const mark: string = nextCursor === null ? '' : `&cursor=${nextCursor}`;
      ({ nextCursor } = await list(`sort=${sort}&limit=50${mark}`));
    }
    for (const query of [`sort=${sort}&limit=25`, `sort=${sort}&limit=25&cursor=${nextCursor}`]) {
      for (const plan of await plansOf(query)) {
        expect(plan).toMatchObject({ table: 'lots', key });
        expect(plan.type).not.toBe('ALL');
        expect(plan.Extra).not.toContain('filesort');
        expect(Number.parseInt(plan.r_rows ?? '', 10)).toBeLessThanOrEqual(40);
      }
    }
  });
});
