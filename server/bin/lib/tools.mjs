import { spawn } from 'node:child_process';
import { root } from './paths.mjs';

const running = new Set();

/**
 * Runs a program to its end and tells whether it worked. Its output goes to stderr: stdout belongs to the caller,
 * whose last line may be read by a program.
 */
export function runTool(program, args, { env = process.env, input = 'ignore', output = 2 } = {}) {
  return new Promise((resolve) => {
    const child = spawn(program, args, { cwd: root, env, stdio: [input, output, output] });
    running.add(child);
    const end = (hasWorked) => {
      running.delete(child);
      resolve(hasWorked);
    };
    child.once('error', () => end(false));
    child.once('exit', (code) => end(code === 0));
  });
}

/** Asks the programs that run now to end, and waits for them. */
export async function endTools() {
  await Promise.all(
    [...running].map(
      (child) =>
        new Promise((resolve) => {
          child.once('exit', resolve);
          child.kill('SIGTERM');
        }),
    ),
  );
}
