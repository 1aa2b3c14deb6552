import { announce } from './announce.mjs';
import { leaveAfter, watchForEnd } from './ending.mjs';
import { logTail } from './children.mjs';
import { prepareStart } from './prepare.mjs';
import { createProduct } from './product.mjs';
import { Halt, say } from './say.mjs';
import { endTools } from './tools.mjs';

/** Starts the whole product and keeps it until a signal comes or a part dies. */
export async function runProduct({ mode, onOutput }) {
  const startedAt = performance.now();
  let product;
  let isReady = false;
  const { ended, fail, finish } = watchForEnd({ force: () => product?.forceAll() });
  const describe = () => ({ pid: process.pid, url: product?.urls.product, isReady });

  async function start() {
    await prepareStart({ describe, needsClient: mode === 'start' });
    product = await createProduct({
      mode,
      onOutput,
      onUnexpectedEnd: (child, how) => fail(unexpected(child, how)),
    });
    say('Starting …');
    await product.startAll();
    isReady = true;
    announce({ urls: product.urls, startedAt });
    // A program that started this one (the browser tests do) hears the addresses in this way; when it goes, we go.
    process.send?.({ urls: product.urls, ports: product.ports, env: product.env });
  }

  process.once('disconnect', finish);
  start().catch(fail);
  await leaveAfter(ended, async () => {
    await endTools();
    if (!product) return;
    await product.stopAll();
    say('Stopped.');
  });
}

function unexpected(child, { code, signalName, error }) {
  const how = error?.message ?? (signalName ? `ended by ${signalName}` : `exit ${code}`);
  return new Halt(
    `${child.name} ended unexpectedly (${how}); stopping everything. Its last lines:\n\n${logTail(child)}\n\nWhole log: ${child.logFile}`,
  );
}
