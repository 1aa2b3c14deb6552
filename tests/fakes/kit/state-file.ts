import {
  closeSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  writeSync,
} from 'node:fs';
import path from 'node:path';

/** Replaces the file in one step, so that a kill leaves the old content or the new one. */
export function writeWhole(file: string, content: string | Buffer) {
  const draft = `${file}.new`;
  const handle = openSync(draft, 'w');
  try {
    if (typeof content === 'string') writeSync(handle, content);
    else writeSync(handle, content, 0, content.length);
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
  renameSync(draft, file);
}

export type StateFile<T> = { state: T; save: () => void };

/** State that survives a restart when a folder is given, and lives in memory when not. */
export function openStateFile<T>(folder: string | undefined, name: string, initial: () => T): StateFile<T> {
  if (!folder) return { state: initial(), save: () => undefined };
  mkdirSync(folder, { recursive: true });
  const file = path.join(folder, name);
  const state = existsSync(file) ? (JSON.parse(readFileSync(file, 'utf8')) as T) : initial();
  const save = () => writeWhole(file, JSON.stringify(state, null, 1));
  save();
  return { state, save };
}
