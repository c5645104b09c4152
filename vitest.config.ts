import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'
import { threadCode } from './server/workers/thread-code'

const path = (relative: string) => fileURLToPath(new URL(relative, import.meta.url))

/** The aliases that Nuxt gives, for the projects that run in plain Node. */
const alias = {
  '#shared': path('./shared'),
  '~~': path('.'),
  '~': path('./app'),
}

const node = (name: string, include: string[], extra: Record<string, unknown> = {}) => ({
  resolve: { alias },
  plugins: [threadCode()],
  test: { name, include, environment: 'node' as const, ...extra },
})

export default defineConfig({
  test: {
    projects: [
      node('unit', ['tests/unit/**/*.test.ts']),
      node('server', ['tests/server/**/*.test.ts'], { testTimeout: 60_000, hookTimeout: 120_000 }),
      './tests/nuxt/vitest.config.ts',
      node('e2e', ['tests/e2e/**/*.test.ts'], {
        globalSetup: ['tests/e2e/support/global-setup.ts'],
        testTimeout: 240_000,
        hookTimeout: 240_000,
        fileParallelism: false,
      }),
    ],
  },
})
