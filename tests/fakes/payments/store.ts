import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { State } from './state.ts';

const flushDelayMs = 15;

/** Keeps the state in one JSON file, replaced atomically; without a folder it lives in memory only. */
export interface Store {
  /** Ask for a write soon; several changes share one write. */
  touch(): void;
  /** Resolves when everything changed so far is in the file, so that no answered request can be lost. */
  flushed(): Promise<void>;
  flushNow(): void;
}

export function readState(dataDir: string): State | null {
  if (dataDir === '') return null;
  try {
    return JSON.parse(readFileSync(join(dataDir, 'payments.json'), 'utf8')) as State;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}

export function openStore(dataDir: string, snapshot: () => State): Store {
  let timer: NodeJS.Timeout | null = null;
  let waiters: Array<() => void> = [];
  if (dataDir !== '') mkdirSync(dataDir, { recursive: true });

  const flushNow = (): void => {
    if (timer) clearTimeout(timer);
    timer = null;
    if (dataDir !== '') {
      const file = join(dataDir, 'payments.json');
      writeFileSync(`${file}.new`, JSON.stringify(snapshot()));
      renameSync(`${file}.new`, file);
    }
    const woken = waiters;
    waiters = [];
    for (const wake of woken) wake();
  };

  return {
    touch() {
      if (dataDir === '') return;
      timer ??= setTimeout(flushNow, flushDelayMs);
    },
    flushed() {
      if (timer === null) return Promise.resolve();
      return new Promise((resolve) => waiters.push(resolve));
    },
    flushNow,
  };
}
