import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['tests/**/*.test.ts'],
    coverage: {
      provider: 'v8',
      include: ['core/**/*.ts', 'server/**/*.ts'],
      reporter: ['text-summary', 'json-summary'],
    },
  },
});
