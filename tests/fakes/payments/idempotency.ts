import { ApiError, invalidRequest } from './errors.ts';
import { now } from './fake.ts';
import type { Fake } from './fake.ts';
import type { SavedAnswer } from './state.ts';

const keyLengthMax = 255;
const keptSeconds = 24 * 60 * 60;

function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return Object.fromEntries(entries.map(([key, inner]) => [key, sorted(inner)]));
}

export function fingerprint(method: string, path: string, body: unknown): string {
  return JSON.stringify([method, path, sorted(body)]);
}

/** Drops what is a day old, so that the file does not grow without end. */
export function forgetOldAnswers(fake: Fake): void {
  const oldest = now(fake) - keptSeconds;
  for (const [slot, answer] of Object.entries(fake.state.answers)) {
    if (answer.savedAt <= oldest) delete fake.state.answers[slot];
  }
}

/** Either the answer kept under the key, or a claim that is to be finished or dropped. */
export interface Claim {
  saved: SavedAnswer | null;
  finish(status: number, body: unknown): void;
  drop(): void;
}

/** Claims a key within its account. Refuses a running twin (409) and other parameters (400). */
export function claimKey(fake: Fake, scope: string, key: string, print: string): Claim {
  if (key.length > keyLengthMax) throw invalidRequest('Idempotency keys have at most 255 characters.');
  const slot = `${scope}:${key}`;
  if (fake.runningKeys.has(slot)) {
    throw new ApiError(
      409,
      {
        type: 'idempotency_error',
        code: 'idempotency_key_in_use',
        message: 'Another request with this Idempotent-Key is still running.',
      },
      false,
    );
  }
  const found = Object.hasOwn(fake.state.answers, slot) ? fake.state.answers[slot] : undefined;
  const saved = found && now(fake) - found.savedAt < keptSeconds ? found : null;
  if (saved && saved.fingerprint !== print) {
    throw new ApiError(
      400,
      {
        type: 'idempotency_error',
        message:
          'Keys for idempotent requests can only be used with the same parameters they were first used with.',
      },
      false,
    );
  }
  if (!saved) fake.runningKeys.add(slot);
  return {
    saved,
    finish(status, body) {
      fake.state.answers[slot] = { fingerprint: print, status, body, savedAt: now(fake) };
      fake.runningKeys.delete(slot);
      fake.store.touch();
    },
    drop() {
      fake.runningKeys.delete(slot);
    },
  };
}
