import { fileURLToPath } from 'node:url'
import { defineVitestProject } from '@nuxt/test-utils/config'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url))
const alias = { '#shared': `${root}shared`, '~~': root.replace(/\/$/, ''), '~': root.replace(/\/$/, '') }

export default defineConfig({
  test: {
    reporters: process.env.CI ? ['default'] : ['default'],
    projects: [
      { resolve: { alias }, test: { name: 'unit', include: ['tests/unit/**/*.test.ts', 'tests/reference/**/*.test.ts'], environment: 'node', setupFiles: ['tests/support/same-seed.ts'], testTimeout: 30_000 } },
      { resolve: { alias }, test: { name: 'server', include: ['tests/server/**/*.test.ts'], environment: 'node', globalSetup: ['tests/support/built-server.ts'], testTimeout: 30_000, hookTimeout: 60_000 } },
      await defineVitestProject({ test: { name: 'nuxt', include: ['tests/nuxt/**/*.test.ts'], environment: 'nuxt', environmentOptions: { nuxt: { domEnvironment: 'happy-dom' } } } }),
      { resolve: { alias }, test: { name: 'e2e', include: ['tests/e2e/**/*.test.ts'], environment: 'node', globalSetup: ['tests/support/built-server.ts'], testTimeout: 90_000, hookTimeout: 90_000, fileParallelism: false } },
    ],
  },
})
