import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'

export default defineConfig({
  root: new URL('..', import.meta.url).pathname,
  plugins: [vue()],
  test: {
    include: ['test/**/*.test.ts'],
    testTimeout: 60_000,
    hookTimeout: 60_000,
    // The last line a machine reads: `N passed, N failed, N skipped`.
    reporters: ['default', './test/plain-count-reporter.ts'],
  },
})
