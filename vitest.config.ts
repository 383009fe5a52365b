import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    reporters: ['default', 'json'],
    outputFile: { json: '.test-results/vitest.json' },
    projects: [
      {
        oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
        test: {
          name: 'unit',
          include: ['tests/{analysis,main,renderer,published}/**/*.test.{ts,tsx}'],
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'whole',
          include: ['tests/whole/**/*.test.ts'],
          globalSetup: ['tests/whole/build-once.ts'],
          testTimeout: 120_000,
          hookTimeout: 180_000,
          fileParallelism: false,
          // a loaded machine takes its time over a plot
          expect: { poll: { timeout: 20_000 } },
        },
      },
    ],
  },
});
