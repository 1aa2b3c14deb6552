import { closeSync, fsyncSync, openSync, readFileSync, renameSync, writeFileSync } from 'node:fs';

/** Writes a JSON file whole or not at all: a reader never sees half of it, a power cut never leaves it empty. */
export function writeJson(file, value, mode = 0o600) {
  const beside = `${file}.${process.pid}.new`;
  const handle = openSync(beside, 'w', mode);
  try {
    writeFileSync(handle, `${JSON.stringify(value, null, 2)}\n`);
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
  renameSync(beside, file);
}

/** The content of a JSON file; undefined when it is missing or broken. */
export function readJson(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return undefined;
  }
}
