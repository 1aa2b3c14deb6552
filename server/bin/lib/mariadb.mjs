import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { findProgram } from './programs.mjs';
import { Halt } from './say.mjs';

const isRoot = process.getuid?.() === 0;
const installedMarker = 'scruple-installed';

/** What the application relies on wherever it runs; it looks these up at boot and refuses to start on others. */
const agreedSettings = [
  '--character-set-server=utf8mb4',
  '--collation-server=utf8mb4_unicode_ci',
  '--default-time-zone=+00:00',
  '--sql-mode=STRICT_TRANS_TABLES,STRICT_ALL_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ZERO_IN_DATE,NO_ZERO_DATE,NO_AUTO_CREATE_USER,NO_ENGINE_SUBSTITUTION',
  '--default-storage-engine=InnoDB',
  '--binlog-format=ROW',
  '--sync-binlog=1',
  '--innodb-autoinc-lock-mode=2',
  '--innodb-snapshot-isolation=ON',
  '--innodb-lock-wait-timeout=5',
  '--idle-transaction-timeout=60',
  '--local-infile=OFF',
  '--max-connections=200',
];

const durable = [
  '--innodb-flush-log-at-trx-commit=1',
  '--innodb-doublewrite=ON',
  '--innodb-flush-method=O_DIRECT',
];
/** For tests alone: nothing there needs to outlive a power cut. */
const relaxed = ['--innodb-flush-log-at-trx-commit=0', '--performance-schema=OFF'];

/**
 * Makes the server's own tables in `folder`. A folder without the marker was left by an install that was cut off and is
 * made anew; nothing can be lost there, for the server never starts before the marker is written.
 */
export function installDatabase(folder, { hasOpenRoot = false } = {}) {
  const marker = path.join(folder, installedMarker);
  if (existsSync(marker)) return { isNew: false };
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const user = os.userInfo().username;
  const result = spawnSync(
    findProgram('mariadb-install-db'),
    [
      '--no-defaults',
      `--datadir=${path.join(folder, 'data')}`,
      ...(isRoot ? ['--user=root'] : []),
      `--auth-root-authentication-method=${hasOpenRoot ? 'normal' : 'socket'}`,
      ...(hasOpenRoot ? [] : [`--auth-root-socket-user=${user}`]),
      '--skip-test-db',
    ],
    { encoding: 'utf8' },
  );
  if (result.status !== 0) {
    throw new Halt(`MariaDB could not make its data folder:\n${tail(`${result.stdout}\n${result.stderr}`)}`);
  }
  writeFileSync(marker, '');
  return { isNew: true };
}

/** Program and arguments of a server on loopback for an installed folder. */
export function serverCommand(folder, { port, initFile, isDurable = true }) {
  return [
    findProgram('mariadbd'),
    // Must come first, or the machine's own configuration is read.
    '--no-defaults',
    `--datadir=${path.join(folder, 'data')}`,
    ...(isRoot ? ['--user=root'] : []),
    '--bind-address=127.0.0.1',
    `--port=${port}`,
    // Relative to the data folder: the path of a socket may not be longer than 107 bytes.
    '--socket=mariadbd.sock',
    '--pid-file=mariadbd.pid',
    ...(initFile ? [`--init-file=${initFile}`] : []),
    ...agreedSettings,
    ...(isDurable ? durable : relaxed),
  ];
}

/**
 * Statements that bring the database and its two users into being, run by the server before it lets anybody in.
 * `scruple_owner` changes tables and hands out rights; `scruple_app` gets its rights table by table from the migrations.
 */
export function writeInitFile(file, { ownerPassword, appPassword, databases = ['scruple'] }) {
  const users = [
    ['scruple_owner', ownerPassword],
    ['scruple_app', appPassword],
  ];
  const hosts = ['localhost', '127.0.0.1'];
  const lines = databases.map(
    (name) => `CREATE DATABASE IF NOT EXISTS \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci;`,
  );
  for (const host of hosts) {
    for (const [user, password] of users) {
      lines.push(`CREATE USER IF NOT EXISTS '${user}'@'${host}' IDENTIFIED BY '${password}';`);
      lines.push(`ALTER USER '${user}'@'${host}' IDENTIFIED BY '${password}';`);
    }
    for (const name of databases) {
      lines.push(`GRANT ALL PRIVILEGES ON \`${name}\`.* TO 'scruple_owner'@'${host}' WITH GRANT OPTION;`);
    }
  }
  writeFileSync(file, `${lines.join('\n')}\n`, { mode: 0o600 });
}

/** Waits until the server takes connections; `isAlive` ends the wait early, `readLog` says why. */
export async function waitForDatabase(port, { isAlive, readLog, patienceMs = 60_000 }) {
  const until = Date.now() + patienceMs;
  while (Date.now() < until && isAlive()) {
    if (await accepts(port)) return;
    await sleep(40);
  }
  throw new Halt(`MariaDB did not start on port ${port}:\n${tail(readLog())}`);
}

function accepts(port) {
  return new Promise((resolve) => {
    const socket = net.connect(port, '127.0.0.1');
    socket.setTimeout(1000, () => socket.destroy());
    // The server speaks first: a greeting means that it serves and does not only listen.
    socket.once('data', () => {
      resolve(true);
      socket.destroy();
    });
    socket.once('error', () => resolve(false));
    socket.once('close', () => resolve(false));
  });
}

/** The process number that a server left in its data folder, if any. */
export function readDatabasePid(folder) {
  try {
    return parseInt(readFileSync(path.join(folder, 'data', 'mariadbd.pid'), 'utf8'), 10) || undefined;
  } catch {
    return undefined;
  }
}

function tail(text) {
  return text.trim().split('\n').slice(-25).join('\n');
}
