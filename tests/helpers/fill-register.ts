import { QueryTypes } from 'sequelize';
import { dec, fixed } from '#shared/decimal.ts';
import type { Metal } from '#shared/metals.ts';
import { newId } from '#server/database/ids.ts';
import { sequelize } from '#server/database/connection.ts';

/** A row of a filled register, with what it is ordered and filtered by. */
export type FilledLot = { id: string; metal: Metal; rank: string | null; grams: string; openedAt: string };

const BATCH = 500;
const CYCLE: readonly Metal[] = ['Au', 'Ag', 'Au', 'Ag', 'Pt', 'Au', 'Ag', 'Pd', 'Au', 'Ag'];

function describeLot(index: number, rates: Readonly<Record<Metal, string>>): FilledLot {
  const metal = CYCLE[index % CYCLE.length]!;
  // 300 steps of a tenth of a percent, so that many lots share a place; every 500th cannot be ranked.
  const percent = dec(BigInt(800 + ((index * 7919) % 300))).div(10);
  const rank = fixed(percent.times(rates[metal]).div(100).div('31.1034768'), 8);
  return {
    id: newId(),
    metal,
    rank: index % 500 === 499 ? null : rank,
    grams: fixed(dec(BigInt(1 + ((index * 104_729) % 2000))).div(4), 2),
    openedAt: new Date(Date.UTC(2026, 10, 1) + ((index * 31) % 9000) * 60_000).toISOString(),
  };
}

async function insert(table: string, columns: readonly string[], rows: readonly unknown[][]): Promise<void> {
  for (let from = 0; from < rows.length; from += BATCH) {
    const part = rows.slice(from, from + BATCH);
    const marks = part.map((row) => `(${row.map(() => '?').join(',')})`).join(',');
    await sequelize.query(`INSERT INTO ${table} (${columns.join(',')}) VALUES ${marks}`, {
      replacements: part.flat(),
      type: QueryTypes.INSERT,
    });
  }
}

const sql = (instant: string) => instant.slice(0, 23).replace('T', ' ');

/** Writes many lots straight into the tables: a register of this size through the commands would take minutes. */
export async function fillRegister(
  sellerId: string,
  count: number,
  rates: Readonly<Record<Metal, string>>,
): Promise<FilledLot[]> {
  const lots = Array.from({ length: count }, (_, index) => describeLot(index, rates));
  const now = sql(new Date().toISOString());
  await insert(
    'lots',
    [
      ...[
        'id',
        'code',
        'seller_id',
        'state',
        'draft',
        'form',
        'title',
        'region',
        'gross_value',
        'gross_unit',
      ],
      ...['gross_grams', 'price_minor', 'shipping_minor', 'destinations', 'evidence_grade', 'assay_version'],
      ...['main_metal', 'main_fineness_permille', 'main_fine_grams', 'rank_price', 'opened_at', 'closes_at'],
      ...['created_at', 'updated_at'],
    ],
    lots.map((lot, index) => [
      ...[
        lot.id,
        `S-${String(index).padStart(6, '0')}`,
        sellerId,
        'open',
        '{}',
        'button',
        'A filled lot',
        'Vale',
      ],
      ...[
        lot.grams,
        'g',
        lot.grams,
        100_000,
        1_000,
        index % 3 === 0 ? '["US","CA"]' : '["US"]',
        'certified',
        1,
      ],
      ...[lot.metal, '1000', lot.grams, lot.rank, sql(lot.openedAt), '2099-01-01', now, now],
    ]),
  );
  await insert(
    'lot_assays',
    [
      ...['id', 'lot_id', 'assay_version', 'position', 'element', 'fineness_value', 'fineness_unit'],
      ...[
        'fineness_permille',
        'uncertainty_permille',
        'is_uncertainty_assumed',
        'method',
        'is_paid_for',
        'created_at',
      ],
    ],
    lots.map((lot) => [
      newId(),
      lot.id,
      1,
      0,
      lot.metal,
      '1000',
      'permille',
      '1000',
      '0.5',
      1,
      'fire_assay',
      1,
      now,
    ]),
  );
  await sequelize.query('ANALYZE TABLE lots, lot_assays', { type: QueryTypes.SELECT });
  return lots;
}
