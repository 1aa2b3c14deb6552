import { readJson } from './files.mjs';
import { inData } from './paths.mjs';
import { say } from './say.mjs';

/** Prints where everything is once all of it is ready. */
export function announce({ urls, startedAt }) {
  const seconds = ((performance.now() - startedAt) / 1000).toFixed(1);
  say();
  say(`Scruple is ready after ${seconds} s:  ${urls.product}`);
  say();
  say('Local stand-ins for the hosted services, no real money:');
  say(`  mailbox   ${urls.mailbox}`);
  say(`  payments  ${urls.payments}`);
  say(`  quotes    ${urls.quotes}`);
  say(`  carrier   ${urls.carrier}`);
  announceAccounts();
  say();
  say(`Logs: ${inData('logs')}    Stop: Ctrl-C`);
}

function announceAccounts() {
  const stored = readJson(inData('demo-accounts.json'));
  const accounts = Array.isArray(stored) ? stored : (stored?.accounts ?? []);
  if (accounts.length === 0) return;
  const common = Array.isArray(stored) ? undefined : stored.password;
  const width = Math.max(...accounts.map(({ email }) => String(email).length));
  say();
  say(`Demo accounts${common ? ` (password of all: ${common})` : ''}:`);
  for (const { email, role, name, password = common } of accounts) {
    const secret = common ? '' : `  ${password}`;
    say(`  ${String(email).padEnd(width)}  ${String(role ?? '').padEnd(7)}${name ?? ''}${secret}`.trimEnd());
  }
}
