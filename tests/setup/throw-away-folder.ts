import { accessSync, constants, existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { endLeftovers } from '#server/bin/lib/children.mjs';
import { readJson, writeJson } from '#server/bin/lib/files.mjs';
import { bootId, identify, type Identity } from '#server/bin/lib/processes.mjs';

const prefix = 'scruple-tests-';

interface Owner extends Identity {
  bootId: string;
}

/** Memory where there is some: a test database needs speed and outlives nothing. */
function placeForFolders(): string {
  try {
    accessSync('/dev/shm', constants.W_OK);
    return '/dev/shm';
  } catch {
    return os.tmpdir();
  }
}

/**
 * A folder of one test run, gone with it. A run that was killed cannot clean up: the next one ends the processes that it
 * noted in its `run.json` and removes its folder.
 */
export async function makeThrowAwayFolder(): Promise<{ folder: string; remove: () => void }> {
  const place = placeForFolders();
  await sweep(place);
  const folder = mkdtempSync(path.join(place, prefix));
  writeJson(path.join(folder, 'owner.json'), { bootId: bootId(), ...identify(process.pid) });
  return { folder, remove: () => rmSync(folder, { recursive: true, force: true, maxRetries: 5 }) };
}

async function sweep(place: string): Promise<void> {
  for (const name of readdirSync(place)) {
    if (!name.startsWith(prefix)) continue;
    const folder = path.join(place, name);
    const owner = readJson(path.join(folder, 'owner.json')) as Owner | undefined;
    if (!owner || isRunning(owner)) continue;
    for (const file of [path.join(folder, 'run.json'), path.join(folder, 'data', 'run.json')]) {
      if (existsSync(file)) await endLeftovers(file);
    }
    rmSync(folder, { recursive: true, force: true });
  }
}

function isRunning(owner: Owner): boolean {
  return owner.bootId === bootId() && identify(owner.pid)?.startedTicks === owner.startedTicks;
}
