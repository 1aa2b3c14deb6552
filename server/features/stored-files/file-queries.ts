import { Op } from 'sequelize';
import { StoredFile } from '#server/models/stored-file.ts';
import { expectedKeys, rowKeysOf } from './expected-keys.ts';

/** Those of the objects that no row stands for. */
export async function withoutRow(objectKeys: readonly string[]): Promise<string[]> {
  if (objectKeys.length === 0) return [];
  const rows = await StoredFile.findAll({
    where: { storageKey: [...new Set(objectKeys.flatMap(rowKeysOf))] },
    attributes: ['kind', 'storageKey'],
  });
  const expected = new Set(rows.flatMap(expectedKeys));
  return objectKeys.filter((key) => !expected.has(key));
}

/** Rows written before a moment, by id, a page at a time. */
export async function filesBefore(before: Date, afterId: string, limit: number): Promise<StoredFile[]> {
  return StoredFile.findAll({
    where: { createdAt: { [Op.lt]: before }, id: { [Op.gt]: afterId } },
    order: [['id', 'ASC']],
    limit,
  });
}
