import react from '@vitejs/plugin-react';
import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const at = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

/** What every project shares: a project that extends the root would take the root's own options too. */
const resolve = {
  alias: [
    // Outside a bundler this package throws; that a browser bundle holds no server code is checked by `next build`.
    { find: /^server-only$/, replacement: at('./tests/support/server-only.ts') },
    { find: /^@\//, replacement: at('./') },
  ],
};
const expect = { requireAssertions: true };

export default defineConfig({
  test: {
    // One group after the other: the groups that start servers get the machine to themselves.
    projects: [
      {
        resolve,
        test: {
          name: 'unit',
          environment: 'node',
          include: ['tests/unit/**/*.test.ts'],
          exclude: ['tests/unit/ui/**'],
          maxWorkers: 2,
          // Nothing is timed by tests: a busy machine must not fail them.
          testTimeout: 60_000,
          sequence: { groupOrder: 1 },
          expect,
        },
      },
      {
        resolve,
        plugins: [react()],
        test: {
          name: 'unit-ui',
          environment: 'jsdom',
          include: ['tests/unit/ui/**/*.test.{ts,tsx}'],
          maxWorkers: 2,
          testTimeout: 60_000,
          sequence: { groupOrder: 1 },
          expect,
        },
      },
      {
        resolve,
        test: {
          name: 'integration',
          environment: 'node',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/support/integration-global.ts'],
          setupFiles: ['tests/support/integration-file.ts'],
          maxWorkers: 2,
          testTimeout: 90_000,
          hookTimeout: 120_000,
          sequence: { groupOrder: 2 },
          expect,
        },
      },
      {
        resolve,
        test: {
          name: 'api',
          environment: 'node',
          include: ['tests/api/**/*.test.ts'],
          globalSetup: ['tests/support/served-global.ts'],
          setupFiles: ['tests/support/served-file.ts'],
          maxWorkers: 1,
          testTimeout: 90_000,
          hookTimeout: 180_000,
          sequence: { groupOrder: 3 },
          expect,
        },
      },
      {
        resolve,
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/support/served-global.ts'],
          setupFiles: ['tests/support/served-file.ts'],
          maxWorkers: 1,
          testTimeout: 180_000,
          hookTimeout: 180_000,
          sequence: { groupOrder: 4 },
          expect,
        },
      },
      {
        resolve,
        test: {
          name: 'setup',
          environment: 'node',
          include: ['tests/setup/**/*.test.ts'],
          setupFiles: ['tests/support/setup-file.ts'],
          maxWorkers: 1,
          testTimeout: 240_000,
          hookTimeout: 240_000,
          sequence: { groupOrder: 5 },
          expect,
        },
      },
    ],
  },
});
