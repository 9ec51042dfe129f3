// Where the tests are, and the constant that the bundle defines.
import { defineConfig } from 'vitest/config'

export default defineConfig({
  define: { programVersion: JSON.stringify('0.0.0-test') },
  test: { root: new URL('..', import.meta.url).pathname, include: ['test/**/*.test.ts'], testTimeout: 60_000, hookTimeout: 60_000 },
})
