import { defineConfig } from 'vitest/config'

export const configuration = defineConfig({
  test: { root: new URL('..', import.meta.url).pathname, include: ['test/**/*.test.ts'], testTimeout: 60_000, hookTimeout: 60_000 },
})
export default configuration
