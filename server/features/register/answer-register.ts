import { REGISTER_COUNT_MAX } from '#shared/limits.ts';
import type { RegisterAnswer, RegisterQuery } from '#shared/schemas/lots.ts';
import { invariant } from '#server/app-error.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { firstPhotos } from '#server/features/lots/lot-queries.ts';
import { newestQuotes, quoteRefs, type QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import { Lot } from '#server/models/lot.ts';
import { LotAssay } from '#server/models/lot-assay.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { rankQuotesOf, readCursor, writeCursor } from './register-cursor.ts';
import { presentRegisterRow, type RegisterSource } from './register-presenter.ts';
import { countLots, listLots, type Ranked } from './register-queries.ts';

/** Reads the lots of a page in three queries, whatever its size, in the page's order. */
async function readSources(page: readonly Ranked[]): Promise<RegisterSource[]> {
  const ids = page.map((row) => row.id);
  const [lots, assays, photos] = await Promise.all([
    Lot.findAll({ where: { id: ids }, attributes: { exclude: ['draft', 'description'] } }),
    LotAssay.findAll({ where: { lotId: ids } }),
    firstPhotos(ids),
  ]);
  const byId = new Map(lots.map((lot) => [lot.id, lot]));
  return ids.map((id) => {
    const lot = byId.get(id);
    invariant(lot !== undefined, 'a lot is never deleted once it is listed');
    return {
      lot,
      assays: assays.filter((assay) => assay.lotId === id && assay.assayVersion === lot.assayVersion),
      photoId: photos.get(id) ?? null,
    };
  });
}

/** The oldest of the quotes that the page's figures rest on. */
function quotedAt(board: QuoteBoard): string | null {
  const times = Object.values(board.byMetal).map((quote) => quote.at.getTime());
  return times.length === 0 ? null : new Date(Math.min(...times)).toISOString();
}

/**
 * One page of the register. Order and % filter follow the quotes that the listing began with, named by its cursor; the
 * figures shown are always at the newest ones. Throws `invalid-input` for a cursor that is not ours.
 */
export async function answerRegister(query: RegisterQuery, viewer: Actor | null): Promise<RegisterAnswer> {
  const board = await newestQuotes(await databaseNow());
  const cursor = query.cursor === undefined ? null : readCursor(query.cursor, query.sort);
  const quotes = cursor?.quotes ?? rankQuotesOf(board);
  const [found, count] = await Promise.all([
    listLots({ query, quotes, after: cursor?.position ?? null }),
    countLots(query, quotes),
  ]);
  const page = found.slice(0, query.limit);
  const last = page.at(-1);
  const hasMore = found.length > query.limit && last !== undefined;
  const refs = quoteRefs(board);
  return {
    rows: (await readSources(page)).map((source) =>
      presentRegisterRow(source, { quotes: refs, board, viewer }),
    ),
    nextCursor: hasMore
      ? writeCursor({
          sort: query.sort,
          quotes,
          position: { stream: query.sort === 'newest' ? null : last.stream, value: last.value, id: last.id },
        })
      : null,
    count: Math.min(count, REGISTER_COUNT_MAX),
    isCountCapped: count > REGISTER_COUNT_MAX,
    quoteState: board.state,
    quotedAt: quotedAt(board),
  };
}
