import { expect } from 'vitest';

/** What the page is going to show, asked for until it does; a busy machine takes its time. */
export function soon<T>(read: () => Promise<T>, timeout = 20_000) {
  return expect.poll(read, { timeout, interval: 100 });
}
