import { defineConfig } from 'vitest/config';

// Two projects: most tests share one module graph per worker, which is several times faster; tests that start
// processes or drive a pseudo-terminal run after them, one file at a time, so that they do not fight over the cores.
export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'unit',
          include: ['tests/**/*.test.{ts,tsx}'],
          exclude: ['tests/e2e/**'],
          isolate: false,
          pool: 'threads',
          sequence: { groupOrder: 0 },
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.{ts,tsx}'],
          pool: 'forks',
          fileParallelism: false,
          sequence: { groupOrder: 1 },
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
});
