import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

/**
 * Five projects: `unit` needs nothing; `client` runs in jsdom with msw; `server` has a real MariaDB in a throw-away
 * folder; `boot` starts, kills and restarts the product as a process; `e2e` starts the whole product beside its own
 * database and drives Debian's Chromium.
 */
export default defineConfig({
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          environment: 'node',
          include: ['{shared,server,jobs}/**/*.test.ts', 'client/**/*.test.ts', 'tests/*.test.ts'],
        },
      },
      {
        extends: true,
        plugins: [react()],
        test: {
          name: 'client',
          environment: 'jsdom',
          include: ['client/**/*.test.tsx'],
          setupFiles: ['tests/setup/client.ts'],
          testTimeout: 20_000,
          environmentOptions: { jsdom: { url: 'http://localhost:3000' } },
        },
      },
      {
        extends: true,
        test: {
          name: 'server',
          environment: 'node',
          include: ['tests/{api,stories,jobs,contracts,database}/**/*.test.ts'],
          globalSetup: ['tests/setup/database.ts'],
          setupFiles: ['tests/setup/server.ts'],
          testTimeout: 20_000,
          hookTimeout: 30_000,
          maxWorkers: 2,
        },
      },
      {
        extends: true,
        test: {
          name: 'boot',
          environment: 'node',
          include: ['tests/boot/**/*.spec.ts'],
          testTimeout: 90_000,
          hookTimeout: 60_000,
          fileParallelism: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          environment: 'node',
          include: ['tests/e2e/**/*.spec.ts'],
          globalSetup: ['tests/setup/whole-product.ts'],
          testTimeout: 180_000,
          hookTimeout: 180_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
