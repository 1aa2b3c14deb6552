import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { startProduct } from './start-product.ts';
import { makeThrowAwayFolder } from './throw-away-folder.ts';

declare module 'vitest' {
  interface ProvidedContext {
    baseUrl: string;
    mailboxUrl: string;
    paymentsUrl: string;
    carrierUrl: string;
    quotesUrl: string;
    productDatabaseUrl: string;
    demoAccountsFile: string;
  }
}

/** The whole product as `npm start` starts it, demo included, in a throw-away folder and on ports of its own. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const { folder, remove } = await makeThrowAwayFolder();
  try {
    // All people of these tests come from one address, and in a few minutes.
    const env = { RATE_LIMIT_FACTOR: '20' };
    const product = await startProduct({ dataFolder: path.join(folder, 'data'), env });
    const { urls, env: given } = product.ready;
    project.provide('baseUrl', urls.product);
    project.provide('mailboxUrl', urls.mailbox);
    project.provide('paymentsUrl', urls.payments);
    project.provide('carrierUrl', urls.carrier);
    project.provide('quotesUrl', urls.quotes);
    project.provide('productDatabaseUrl', given.DATABASE_OWNER_URL);
    project.provide('demoAccountsFile', given.DEMO_ACCOUNTS_FILE);
    return async () => {
      await product.stop();
      remove();
    };
  } catch (error) {
    remove();
    throw error;
  }
}
