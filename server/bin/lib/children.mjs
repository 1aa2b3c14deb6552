import { spawn } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync, renameSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { readJson, writeJson } from './files.mjs';
import { inData, root } from './paths.mjs';
import { bootId, endProcess, identify, signal } from './processes.mjs';
import { Halt, say } from './say.mjs';

const patienceMs = { database: 60_000, usual: 15_000 };

/**
 * The processes of one run, in the order they were started. Each has its own process group, so that Ctrl-C reaches
 * only the run itself, which then stops them one after the other in reverse order.
 */
export function createChildren({ onUnexpectedEnd }) {
  const children = [];
  let stopping;

  function start(name, command, { env, cwd = root, onOutput, canSend = false } = {}) {
    if (stopping) throw new Halt(`${name} is not started any more: everything is being stopped.`);
    const logFile = openLog(name);
    const handle = openSync(logFile, 'a', 0o600);
    const [program, ...args] = command;
    const output = onOutput ? 'pipe' : handle;
    const process_ = spawn(program, args, {
      cwd,
      env,
      detached: true,
      stdio: ['ignore', output, output, ...(canSend ? ['ipc'] : [])],
    });
    const child = {
      name,
      process: process_,
      pid: process_.pid,
      logFile,
      hasEnded: false,
      isExpectedToEnd: false,
    };
    child.ended = new Promise((resolve) => {
      process_.once('error', (error) => resolve({ error }));
      process_.once('exit', (code, signalName) => resolve({ code, signalName }));
    }).then((how) => {
      child.hasEnded = true;
      if (child.pid) signal(-child.pid, 'SIGKILL');
      if (!stopping && !child.isExpectedToEnd) onUnexpectedEnd(child, how);
      return how;
    });
    if (onOutput) onOutput(process_, handle);
    else closeSync(handle);
    children.push(child);
    record(children);
    return child;
  }

  async function stop(child) {
    child.isExpectedToEnd = true;
    if (!child.hasEnded && child.pid) {
      signal(child.pid, 'SIGTERM');
      const patience = patienceMs[child.name] ?? patienceMs.usual;
      const how = await Promise.race([child.ended, sleep(patience, 'late', { ref: false })]);
      if (how === 'late') {
        say(`${child.name} did not stop within ${patience / 1000} s: forcing it.`);
        signal(-child.pid, 'SIGKILL');
        await child.ended;
      }
    }
    const place = children.indexOf(child);
    if (place >= 0) children.splice(place, 1);
    record(children);
  }

  /** Stops all, last started first. */
  function stopAll() {
    stopping ??= (async () => {
      while (children.length > 0) await stop(children[children.length - 1]);
    })();
    return stopping;
  }

  /** Ends everything at once, without asking. */
  function forceAll() {
    stopping ??= Promise.resolve();
    for (const child of children) if (child.pid) signal(-child.pid, 'SIGKILL');
  }

  return { start, stop, stopAll, forceAll };
}

/** The first and the last lines of a short-lived child: an error begins with its message and may go on for pages. */
export function logEnds(child) {
  const lines = logTail(child, Infinity).split('\n');
  return lines.length <= 40 ? lines.join('\n') : [...lines.slice(0, 25), '…', ...lines.slice(-12)].join('\n');
}

/** The last lines a child wrote. */
export function logTail(child, lines = 25) {
  try {
    return readFileSync(child.logFile, 'utf8').trim().split('\n').slice(-lines).join('\n');
  } catch {
    return '';
  }
}

function openLog(name) {
  const file = inData('logs', `${name}.log`);
  if (existsSync(file)) renameSync(file, inData('logs', `${name}.previous.log`));
  return file;
}

/** Notes who runs, so that a start after a crash of this one finds and ends what it left behind. */
function record(children) {
  writeJson(inData('run.json'), {
    bootId: bootId(),
    children: children.map(({ name, pid }) => ({ name, ...identify(pid), pid })),
  });
}

/**
 * Ends what a run that was killed left behind, newest first. A process is only touched when its number, its start time
 * and its boot are those noted: a number alone may by now belong to somebody else.
 */
export async function endLeftovers(file = inData('run.json')) {
  const noted = readJson(file);
  if (!noted?.children || noted.bootId !== bootId()) return;
  const left = noted.children.filter(({ pid, startedTicks }) => {
    const now = identify(pid);
    return now && now.startedTicks === startedTicks;
  });
  if (left.length === 0) return;
  say(
    `An earlier run was killed and left ${left.map(({ name }) => name).join(', ')} running: stopping them.`,
  );
  for (const { name, pid } of left.reverse()) {
    await endProcess(pid, patienceMs[name] ?? patienceMs.usual);
    signal(-pid, 'SIGKILL');
  }
}
