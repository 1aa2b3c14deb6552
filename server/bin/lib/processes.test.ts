import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { describe, expect, it } from 'vitest';
import { endProcess, identify } from './processes.mjs';

function startNode(script: string) {
  return spawn(process.execPath, ['-e', `${script}; console.log('up')`], {
    stdio: ['ignore', 'pipe', 'ignore'],
  });
}

describe('processes', () => {
  it('knows itself by number, start and command', () => {
    expect(identify(process.pid)).toMatchObject({
      pid: process.pid,
      startedTicks: expect.stringMatching(/^\d+$/),
      command: expect.stringContaining('node'),
    });
  });

  it('knows nothing of a number that nobody has', () => {
    expect(identify(2 ** 22 + 1)).toBeUndefined();
  });

  it.each([
    ['ends a process that listens', 'setInterval(() => {}, 1000)', 'SIGTERM'],
    [
      'forces one that does not listen',
      "process.on('SIGTERM', () => {}); setInterval(() => {}, 1000)",
      'SIGKILL',
    ],
  ])('%s', async (_title, script, endedBy) => {
    const child = startNode(script);
    const exit = once(child, 'exit');
    await once(child.stdout, 'data');
    await endProcess(child.pid ?? 0, 300);
    expect(await exit).toEqual([null, endedBy]);
  });
});
