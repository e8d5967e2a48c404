import path from 'node:path'
import { defineConfig } from 'vitest/config'

const here = import.meta.dirname
// The long run tries each property ten times as often.
const long = process.env.LONG ? 10 : 1
const alias = { '@': here, 'server-only': path.join(here, 'tests/support/empty.ts') }

export default defineConfig({
  resolve: { alias },
  test: {
    reporters: ['default'],
    projects: [
      {
        resolve: { alias },
        test: {
          name: 'unit',
          include: ['tests/unit/**/*.test.ts', 'tests/unit/**/*.test.tsx'],
          testTimeout: 60_000 * long,
        },
      },
      { resolve: { alias }, test: { name: 'reference', include: ['tests/reference/**/*.test.ts'] } },
      {
        resolve: { alias },
        test: {
          name: 'scoring',
          include: ['tests/scoring/**/*.test.ts'],
          testTimeout: 600_000,
          hookTimeout: 600_000,
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'server',
          include: [
            'tests/integration/**/*.test.ts',
            'tests/browser/**/*.test.ts',
            'tests/faults/**/*.test.ts',
          ],
          globalSetup: ['tests/support/global-setup.ts'],
          setupFiles: ['tests/support/in-process.ts'],
          testTimeout: 60_000 * long,
          hookTimeout: 180_000,
          // One server and one browser serve all files; a second file at a time only slows both on two cores.
          maxWorkers: 1,
        },
      },
    ],
  },
})
