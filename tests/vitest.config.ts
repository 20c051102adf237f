import { defineConfig } from 'vitest/config'

/** Run from the root of the project: `npx vitest run --config tests/vitest.config.ts`. */
export default defineConfig({
  define: { PLATEMARK_VERSION: JSON.stringify('0.0.0') },
  test: {
    include: ['tests/**/*.test.ts'],
    exclude: ['tests/bench/**', 'node_modules/**'],
    pool: 'threads',
    maxWorkers: 2,
    testTimeout: 120_000,
    hookTimeout: 240_000,
  },
})
