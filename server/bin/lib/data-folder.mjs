import { chmodSync, existsSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { dataFolder, inData } from './paths.mjs';
import { Halt, say } from './say.mjs';

const made = ['mariadb', 'fakes', 'storage', 'demo-accounts.json', 'demo-begun', 'demo-done'];

/** Makes the data folder with what the children expect to find in it; nobody else may look inside. */
export function makeDataFolder() {
  try {
    makeFolders();
  } catch (error) {
    if (!['EACCES', 'EPERM', 'EROFS'].includes(error.code)) throw error;
    throw new Halt(
      `The data folder ${dataFolder} belongs to another user or cannot be written (${error.code}: ${error.path ?? ''}).\n` +
        'Start as the user who made it, or give it to this one: chown -R.',
    );
  }
}

function makeFolders() {
  for (const folder of ['.', 'logs', 'fakes', 'storage']) {
    mkdirSync(inData(folder), { recursive: true, mode: 0o700 });
  }
  for (const name of ['payments', 'quotes', 'mail', 'carrier']) {
    mkdirSync(inData('fakes', name), { recursive: true, mode: 0o700 });
  }
  chmodSync(dataFolder, 0o700);
}

/** Removes database, stand-ins' memory, uploads and demo; secrets, ports and logs stay. */
export function emptyDataFolder() {
  for (const name of made) rmSync(inData(name), { recursive: true, force: true });
}

/** A demo that was begun and not finished is worth nothing, and nobody was let in before it was: begin anew. */
export function mendHalfMadeDemo() {
  if (!existsSync(inData('demo-begun')) || existsSync(inData('demo-done'))) return;
  say('An earlier start was cut off while it made the demo: making everything anew.');
  emptyDataFolder();
}

/** A database that is new beside memories of an older one would contradict them. */
export function forgetWithoutDatabase() {
  for (const name of made.slice(1)) rmSync(inData(name), { recursive: true, force: true });
  makeDataFolder();
}

/** Whether the demo is there. */
export function hasDemo() {
  return existsSync(inData('demo-done'));
}

/** Makes the demo with `make`, leaving a note before and after. */
export async function makeDemoOnce(make) {
  writeFileSync(inData('demo-begun'), '');
  await make();
  writeFileSync(inData('demo-done'), '');
}
