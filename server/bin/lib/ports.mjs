import { randomInt } from 'node:crypto';
import net from 'node:net';
import { readJson, writeJson } from './files.mjs';
import { inData } from './paths.mjs';
import { Halt, say } from './say.mjs';

const defaults = {
  product: 3000,
  database: 33100,
  payments: 4101,
  quotes: 4102,
  smtp: 4103,
  mailbox: 4104,
  carrier: 4105,
  pages: 5173,
};

/** Whether a port on an address can be listened on now. */
export function isPortFree(port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const probe = net.createServer();
    probe.once('error', () => resolve(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** Below the range from which systems take the near end of outgoing connections: nobody else is given one of these. */
const throwAway = { first: 20_000, last: 32_000 };

/**
 * A free loopback port by chance. Not the system's own choice: some systems give the same port again as soon as it was let
 * go, and another process may get it as the near end of a connection before it is listened on.
 */
export async function freePort() {
  for (let tries = 0; tries < 200; tries += 1) {
    const port = randomInt(throwAway.first, throwAway.last);
    if (await isPortFree(port)) return port;
  }
  throw new Halt('No free loopback port was found.');
}

/**
 * One port for each name: the one of last time, else the usual one, else the next free one, which is said aloud.
 * `PORT` names the product's own. With `SCRUPLE_PORTS=free` all of them are chosen by chance (throw-away starts).
 */
export async function choosePorts(names) {
  const remembered = readRemembered();
  const ports = {};
  for (const name of names) {
    ports[name] =
      process.env.SCRUPLE_PORTS === 'free'
        ? await freePortOutside(Object.values(ports))
        : await choosePort(name, remembered[name], ports);
  }
  writeJson(inData('ports.json'), { ...remembered, ...ports });
  return ports;
}

async function choosePort(name, remembered, chosen) {
  const asked = name === 'product' ? readAskedPort() : undefined;
  const first = asked ?? remembered ?? defaults[name];
  const host = name === 'product' && process.env.HOST ? process.env.HOST : '127.0.0.1';
  const reserved = new Set([...Object.values(chosen), ...Object.values(defaults).filter((p) => p !== first)]);
  for (let port = first; port < first + 200 && port <= 65535; port += 1) {
    if (reserved.has(port) || !(await isPortFree(port, host))) continue;
    if (port !== first) say(`Port ${first} (${name}) is taken by another program: using ${port} instead.`);
    return port;
  }
  throw new Halt(`No free port found for ${name} from ${first} on. Set PORT to a free one, or free some.`);
}

function readAskedPort() {
  if (!process.env.PORT) return undefined;
  const port = /^\d{1,5}$/.test(process.env.PORT) ? parseInt(process.env.PORT, 10) : 0;
  if (port < 1 || port > 65535)
    throw new Halt(`PORT is "${process.env.PORT}": it must be a number from 1 to 65535.`);
  return port;
}

async function freePortOutside(taken) {
  for (let tries = 0; tries < 50; tries += 1) {
    const port = await freePort();
    if (!taken.includes(port)) return port;
  }
  throw new Halt('No free loopback port was found.');
}

function readRemembered() {
  const stored = readJson(inData('ports.json')) ?? {};
  return Object.fromEntries(
    Object.entries(stored).filter(([, port]) => Number.isInteger(port) && port > 0 && port < 65536),
  );
}
