import path from 'node:path';
import { defineConfig } from 'vitest/config';

const root = import.meta.dirname;
const alias = { '@': root, 'server-only': path.join(root, 'tests/support/server-only.ts') };

export default defineConfig({
  resolve: { alias },
  test: {
    projects: [
      {
        resolve: { alias },
        test: {
          name: 'engine',
          include: ['tests/unit/formability/**/*.test.ts'],
          testTimeout: 120_000,
          maxWorkers: 2,
          // The engine keeps no state: its modules are loaded once a worker, not once a file.
          isolate: false,
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'unit',
          include: ['tests/unit/**/*.test.{ts,tsx}'],
          exclude: ['tests/unit/formability/**'],
          testTimeout: 120_000,
          maxWorkers: 2,
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'integration',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/support/global-services.ts'],
          testTimeout: 60_000,
          hookTimeout: 120_000,
          maxWorkers: 2,
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: ['tests/support/global-product.ts'],
          testTimeout: 300_000,
          hookTimeout: 300_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
