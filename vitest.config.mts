import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

const here = (path: string) => fileURLToPath(new URL(path, import.meta.url))
const resolve = { alias: { '@': here('.'), 'server-only': here('./tests/support/empty.ts') } }
const project = (name: string, more: object = {}) => ({
  resolve,
  test: { name, include: [`tests/${name}/**/*.test.{ts,tsx}`], env: { TZ: 'UTC' }, ...more },
})

export default defineConfig({
  root: here('.'),
  resolve,
  test: {
    projects: [
      // hashing a password is slow on purpose, and slower on a busy machine
      project('unit', { testTimeout: 60_000 }),
      project('property', { testTimeout: 120_000, setupFiles: ['tests/support/fixed-seed.ts'] }),
      project('integration', {
        testTimeout: 120_000,
        hookTimeout: 120_000,
        maxWorkers: 2,
        globalSetup: ['tests/support/global-setup.ts'],
      }),
      project('routes', {
        testTimeout: 120_000,
        hookTimeout: 120_000,
        maxWorkers: 2,
        globalSetup: ['tests/support/global-setup.ts'],
      }),
      project('browser', { testTimeout: 300_000, hookTimeout: 300_000, maxWorkers: 1, fileParallelism: false }),
    ],
  },
})
