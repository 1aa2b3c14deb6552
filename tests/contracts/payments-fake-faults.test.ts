import { spawn } from 'node:child_process';
import type { ChildProcess } from 'node:child_process';
import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { clientFor, failureOf, postJson, startKit } from './payments-fake-kit.ts';
import type { Kit } from './payments-fake-kit.ts';

const params = { type: 'express' } as const;

describe('faults of the next calls', () => {
  let kit: Kit;
  beforeAll(async () => {
    kit = await startKit();
  });
  afterAll(() => kit.close());

  it.each([
    ['500', 'StripeAPIError', 500],
    ['409', 'StripeAPIError', 409],
    ['429', 'StripeRateLimitError', 429],
    ['402', 'StripeCardError', 402],
    ['html', 'StripeAPIError', undefined],
    ['reset', 'StripeConnectionError', undefined],
  ])('answers once with %s and then as usual', async (kind, type, status) => {
    const path = '/v1/balance';
    // A closed connection is tried once more by the SDK itself, so it has to fail twice.
    await kit.control('faults', { method: 'GET', path, kind, count: kind === 'reset' ? 2 : 1 });
    const error = await failureOf(kit.stripe.balance.retrieve());
    expect(error.type).toBe(type);
    if (status !== undefined) expect(error.statusCode).toBe(status);
    expect((await kit.stripe.balance.retrieve()).object).toBe('balance');
  });

  it('hangs until the client gives up', async () => {
    await kit.control('faults', { path: '/v1/bal*', kind: 'hang' });
    const call = kit.stripe.balance.retrieve({}, { timeout: 200, maxNetworkRetries: 0 });
    expect((await failureOf(call)).type).toBe('StripeConnectionError');
  });

  it('lets the SDK retry two failures before they have any effect', async () => {
    await kit.control('faults', { method: 'POST', path: '/v1/accounts', kind: '500', count: 2 });
    const before = (await kit.stripe.accounts.list({ limit: 100 })).data.length;
    const account = await clientFor(kit.port, 2).accounts.create(params, { idempotencyKey: 'retry-1' });
    const after = (await kit.stripe.accounts.list({ limit: 100 })).data;
    expect(after[0]?.id).toBe(account.id);
    expect(after.length - before).toBe(1);
  });

  it.each(['500', 'reset', 'html'])('loses the answer by %s after the work, not the work', async (kind) => {
    const options = { idempotencyKey: `lost-${kind}` };
    const before = (await kit.stripe.accounts.list({ limit: 100 })).data.length;
    await kit.control('faults', { method: 'POST', path: '/v1/accounts', kind, stage: 'after' });
    const account = await clientFor(kit.port, 2).accounts.create(params, options);
    expect(account.lastResponse.headers['idempotent-replayed']).toBe('true');
    expect((await kit.stripe.accounts.list({ limit: 100 })).data.length - before).toBe(1);
  });

  it('saves a failure under its key when told to', async () => {
    await kit.control('faults', { method: 'POST', path: '/v1/accounts', kind: '500', stage: 'saved' });
    const create = () => kit.stripe.accounts.create(params, { idempotencyKey: 'burnt' });
    expect((await failureOf(create())).statusCode).toBe(500);
    expect((await failureOf(create())).statusCode).toBe(500);
  });

  it('refuses a fault that it does not know', async () => {
    const answer = await fetch(`${kit.url}/control/faults`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ kind: 'earthquake' }),
    });
    expect(answer.status).toBe(400);
  });

  it('begins anew after a reset', async () => {
    await kit.stripe.accounts.create(params);
    await kit.control('reset');
    expect((await kit.stripe.accounts.list()).data).toEqual([]);
  });
});

describe('as a process', () => {
  const entry = join(import.meta.dirname, '../fakes/payments/index.ts');
  let folder = '';
  let child: ChildProcess;

  const start = async (): Promise<string> => {
    child = spawn(process.execPath, ['--import', 'tsx', entry], {
      env: { ...process.env, FAKE_PORT: '0', FAKE_DATA_DIR: folder },
      stdio: ['ignore', 'pipe', 'inherit'],
    });
    return new Promise((resolve, reject) => {
      let output = '';
      child.stdout?.on('data', (chunk: Buffer) => {
        output += chunk.toString();
        const url = /http:\/\/\S+(?=\n)/.exec(output)?.[0];
        if (url) resolve(url);
      });
      child.once('exit', (code) => reject(new Error(`The process ended with ${code}: ${output}`)));
    });
  };
  const end = (signal: NodeJS.Signals): Promise<number | null> =>
    new Promise((resolve) => {
      child.removeAllListeners('exit');
      child.once('exit', resolve);
      child.kill(signal);
    });

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'payments-fake-'));
  });
  afterAll(async () => {
    if (child.exitCode === null && child.signalCode === null) await end('SIGKILL');
    await rm(folder, { recursive: true, force: true });
  });

  // Three starts of a process on a busy machine take their time.
  it('loses nothing that it has answered, killed or stopped', { timeout: 90_000 }, async () => {
    const first = await start();
    expect(await (await fetch(`${first}/control/health`)).json()).toEqual({ ready: true });
    const port = (url: string): number => Number.parseInt(new URL(url).port, 10);
    const account = await clientFor(port(first)).accounts.create(params, { idempotencyKey: 'kept' });
    await end('SIGKILL');

    const second = await start();
    const again = await clientFor(port(second)).accounts.create(params, { idempotencyKey: 'kept' });
    expect(again.id).toBe(account.id);
    await postJson(`${second}/control/onboard`, { accountId: account.id });
    await postJson(`${second}/control/clock`, { advanceSeconds: 100 });
    expect(await end('SIGTERM')).toBe(0);

    const third = await start();
    const kept = await clientFor(port(third)).accounts.retrieve(account.id);
    const dump = (await (await fetch(`${third}/control/dump`)).json()) as { clockOffsetSeconds: number };
    expect([kept.payouts_enabled, dump.clockOffsetSeconds]).toEqual([true, 100]);
    expect(await readdir(folder)).toEqual(['payments.json']);
    expect(await end('SIGTERM')).toBe(0);
  });
});
