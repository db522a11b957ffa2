import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vitest/config';

const node = { environment: 'node' as const };
const withDatabase = { ...node, globalSetup: ['tests/support/postgres.setup.ts'], hookTimeout: 60_000 };

export default defineConfig({
  test: {
    reporters: ['default', './tests/support/closing-line.ts'],
    projects: [
      {
        plugins: [vue()],
        test: { ...node, name: 'unit', include: ['tests/{unit,component,reference}/**/*.test.ts'], testTimeout: 20_000 },
      },
      { test: { ...node, name: 'properties', include: ['tests/properties/**/*.test.ts'], testTimeout: 60_000 } },
      { plugins: [vue()], test: { ...withDatabase, name: 'api', include: ['tests/api/**/*.test.ts'], testTimeout: 20_000 } },
      {
        // After the others: a browser beside a solver that takes both processors tells nothing about the app.
        plugins: [vue()],
        test: {
          ...withDatabase,
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          testTimeout: 120_000,
          fileParallelism: false,
          sequence: { groupOrder: 1 },
        },
      },
    ],
  },
});
