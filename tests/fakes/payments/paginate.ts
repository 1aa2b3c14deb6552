import { resourceMissing } from './errors.ts';

interface PageInput {
  limit?: number | undefined;
  starting_after?: string | undefined;
  ending_before?: string | undefined;
  created?: number | { gt?: number; gte?: number; lt?: number; lte?: number } | undefined;
}

function isInRange(created: number, range: PageInput['created']): boolean {
  if (range === undefined) return true;
  if (typeof range === 'number') return created === range;
  return (
    (range.gt === undefined || created > range.gt) &&
    (range.gte === undefined || created >= range.gte) &&
    (range.lt === undefined || created < range.lt) &&
    (range.lte === undefined || created <= range.lte)
  );
}

function position(items: Array<{ id: string }>, id: string, param: string): number {
  const found = items.findIndex((item) => item.id === id);
  if (found < 0) throw resourceMissing('object', id, param, 400);
  return found;
}

/** One page of a newest-first list. */
export function paginate<T extends { id: string }>(items: T[], input: PageInput, url: string) {
  const limit = input.limit ?? 10;
  let rows = items.filter((item) =>
    isInRange('created' in item ? (item.created as number) : 0, input.created),
  );
  if (input.ending_before !== undefined) {
    const before = rows.slice(0, position(rows, input.ending_before, 'ending_before'));
    return {
      object: 'list' as const,
      url,
      has_more: before.length > limit,
      data: before.slice(Math.max(0, before.length - limit)),
    };
  }
  if (input.starting_after !== undefined) {
    rows = rows.slice(position(rows, input.starting_after, 'starting_after') + 1);
  }
  return { object: 'list' as const, url, has_more: rows.length > limit, data: rows.slice(0, limit) };
}

/** A list inside an object, complete by construction. */
export function wholeList<T>(data: T[], url: string) {
  return { object: 'list' as const, data, has_more: false, url };
}
