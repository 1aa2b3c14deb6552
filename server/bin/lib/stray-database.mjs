import { readDatabasePid } from './mariadb.mjs';
import { inData } from './paths.mjs';
import { endProcess, identify } from './processes.mjs';
import { say } from './say.mjs';

/**
 * Ends a server that still holds our data folder although no run notes it (two servers in one folder would wait for
 * each other). A pid file alone proves nothing: the process must be a server started with this very folder.
 */
export async function endStrayDatabase() {
  const folder = inData('mariadb');
  const pid = readDatabasePid(folder);
  const found = pid && identify(pid);
  if (!found?.command.includes(`--datadir=${folder}/data`)) return;
  say('A database server still runs on the data folder: stopping it.');
  await endProcess(pid, 60_000);
}
