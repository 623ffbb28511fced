import { defineConfig } from 'vitest/config';
import { ClosingLine } from './tests/support/closing-line.ts';

export default defineConfig({
  test: {
    include: ['tests/**/*.test.ts'],
    // Room for a busy machine: no test is judged by its time.
    testTimeout: 120_000,
    hookTimeout: 120_000,
    globalSetup: ['tests/support/build-once.ts'],
    reporters: ['default', new ClosingLine()],
    coverage: {
      provider: 'v8',
      include: ['core/**/*.ts', 'server/**/*.ts'],
      reporter: ['text-summary', 'json-summary'],
    },
  },
});
