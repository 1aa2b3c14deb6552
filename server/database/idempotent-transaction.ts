import { QueryTypes } from 'sequelize';
import { AppError, ConflictError, invariant } from '#server/app-error.ts';
import { IdempotencyKey } from '#server/models/idempotency-key.ts';
import type { IdempotencyTicket } from '#server/routing/define-route.ts';
import { sequelize } from './connection.ts';
import { newId } from './ids.ts';
import { withTransaction, type Locks, type Unit } from './transaction.ts';

export type StoredAnswer = { status: number; answer: unknown };

/** Refusals that describe the state of things: the key that met one is burnt and answers the same for ever. */
function isStateRefusal(error: unknown): error is AppError {
  return error instanceof AppError && error.status === 409;
}

async function readStored(ticket: IdempotencyTicket, unit: Unit | null): Promise<StoredAnswer | null> {
  const rows = await sequelize.query<{ input_hash: string; status: number; answer: string | object }>(
    `SELECT input_hash, status, answer FROM idempotency_keys
     WHERE actor_id = ? AND operation = ? AND idempotency_key = ?`,
    {
      replacements: [ticket.actorId, ticket.operation, ticket.key],
      type: QueryTypes.SELECT,
      ...(unit === null ? {} : { transaction: unit.tx }),
    },
  );
  const row = rows[0];
  if (row === undefined) return null;
  if (row.input_hash !== ticket.inputHash) throw new AppError('idempotency-key-reused');
  const answer: unknown = typeof row.answer === 'string' ? JSON.parse(row.answer) : row.answer;
  return { status: row.status, answer };
}

async function store(ticket: IdempotencyTicket, stored: StoredAnswer, unit: Unit): Promise<void> {
  await IdempotencyKey.create(
    {
      id: newId(),
      actorId: ticket.actorId,
      operation: ticket.operation,
      idempotencyKey: ticket.key,
      inputHash: ticket.inputHash,
      status: stored.status,
      answer: stored.answer,
    },
    { transaction: unit.tx },
  );
}

type BurntAnswer = { refusal: { code: AppError['code']; detail: string } };

function rethrowIfBurnt(stored: StoredAnswer): StoredAnswer {
  const refusal = (stored.answer as Partial<BurntAnswer> | null)?.refusal;
  if (stored.status === 409 && refusal !== undefined) throw new ConflictError(refusal.code, refusal.detail);
  return stored;
}

/**
 * A write that moves money. The key is looked up and stored in the same transaction as its effect, so that the two can not
 * come apart; the same request under its key gets the stored answer, another request under it is refused. A refusal for a
 * state reason is stored as well: a retry never changes an answer, a new attempt needs a new key.
 */
export async function withIdempotentTransaction(
  ticket: IdempotencyTicket | null,
  locks: Locks,
  work: (unit: Unit) => Promise<StoredAnswer>,
): Promise<StoredAnswer> {
  invariant(ticket !== null, 'a route that moves money has an idempotency key');
  const before = await readStored(ticket, null);
  if (before !== null) return rethrowIfBurnt(before);
  try {
    const stored = await withTransaction(locks, async (unit) => {
      const known = await readStored(ticket, unit);
      if (known !== null) return known;
      const made = await work(unit);
      await store(ticket, made, unit);
      return made;
    });
    return rethrowIfBurnt(stored);
  } catch (error) {
    // Another request with the same key won the race to the UNIQUE row: its answer is ours.
    const winner = await readStored(ticket, null);
    if (winner !== null) return rethrowIfBurnt(winner);
    if (isStateRefusal(error)) {
      const burnt: BurntAnswer = { refusal: { code: error.code, detail: error.message } };
      await withTransaction({}, (unit) => store(ticket, { status: 409, answer: burnt }, unit)).catch(
        () => undefined,
      );
    }
    throw error;
  }
}

/** The answer that a request has had before under its key, for a write that asks a hosted service between two transactions. */
export async function storedAnswer(ticket: IdempotencyTicket | null): Promise<StoredAnswer | null> {
  invariant(ticket !== null, 'a route that moves money has an idempotency key');
  const stored = await readStored(ticket, null);
  return stored === null ? null : rethrowIfBurnt(stored);
}
