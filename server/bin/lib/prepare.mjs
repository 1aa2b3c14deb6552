import { ensureClient } from './client-build.mjs';
import { endLeftovers } from './children.mjs';
import { makeDataFolder, mendHalfMadeDemo } from './data-folder.mjs';
import { loadSettingsFile } from './environment.mjs';
import { endStrayDatabase } from './stray-database.mjs';
import { ensureNodeModules } from './packages.mjs';
import { ensureMariadb } from './programs.mjs';
import { Halt } from './say.mjs';
import { takeLock } from './single-run.mjs';

/** Refuses what cannot work before anything is touched. */
export function checkMachine() {
  const [major, minor] = process.versions.node.split('.').map((part) => parseInt(part, 10));
  if (major < 20 || (major === 20 && minor < 19)) {
    throw new Halt(`This is Node ${process.versions.node}; Scruple needs 20.19 or newer.`);
  }
  if (process.platform !== 'linux')
    throw new Halt('This start is made for Linux (it was tried on Debian 12).');
}

/** Makes the machine and the data folder ready: lock, leftovers of a killed run, packages, database server, client. */
export async function prepareStart({ describe, needsClient }) {
  checkMachine();
  loadSettingsFile();
  if (process.env.NODE_ENV === 'production') {
    throw new Halt(
      'NODE_ENV is production. This command starts the local stand-ins for payments, quotes, mail and carrier and the\n' +
        'demo, which have no place there. In production set the variables of .env.example, run\n\n' +
        '  node --import tsx server/database/migrate.ts\n  node --import tsx server/index.ts\n  node --import tsx jobs/index.ts\n',
    );
  }
  makeDataFolder();
  const lock = await takeLock(describe);
  await endLeftovers();
  await endStrayDatabase();
  mendHalfMadeDemo();
  makeDataFolder();
  await ensureNodeModules();
  await ensureMariadb();
  if (needsClient) await ensureClient();
  return lock;
}
