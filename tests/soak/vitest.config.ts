import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vitest/config';

/** Long fault and load runs (`npm run soak`); `npm test` has short ones of the same kind. */
export default defineConfig({
  plugins: [vue()],
  test: {
    reporters: ['verbose', './tests/support/closing-line.ts'],
    include: ['tests/soak/**/*.test.ts'],
    globalSetup: ['tests/support/postgres.setup.ts'],
    environment: 'node',
    testTimeout: 900_000,
    hookTimeout: 60_000,
    fileParallelism: false,
  },
});
