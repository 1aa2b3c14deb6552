import { readFileSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';

/** Tells one run of the machine from the next: process numbers start anew with it. */
export function bootId() {
  return readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim();
}

/**
 * What tells a process from a later one that got the same number: when it started (in ticks since boot) and its
 * command line. Undefined when it does not run (a process that ended and was not collected counts as ended).
 */
export function identify(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    if (fields[0] === 'Z' || fields[0] === 'X') return undefined;
    const command = readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').filter(Boolean).join(' ');
    return { pid, startedTicks: fields[19], command };
  } catch {
    return undefined;
  }
}

/** Sends a signal and tells whether there was anyone to get it. */
export function signal(pid, name) {
  try {
    process.kill(pid, name);
    return true;
  } catch {
    return false;
  }
}

/** Asks a process that is not our child to end, waits, and forces it (with its group) when it does not. */
export async function endProcess(pid, patienceMs) {
  signal(pid, 'SIGTERM');
  if (!(await isGoneWithin(pid, patienceMs))) {
    signal(pid, 'SIGKILL');
    await isGoneWithin(pid, 5000);
  }
}

async function isGoneWithin(pid, patienceMs) {
  const until = Date.now() + patienceMs;
  while (identify(pid)) {
    if (Date.now() > until) return false;
    await sleep(25);
  }
  return true;
}
