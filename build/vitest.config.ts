import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'

/** Tests that drive Chromium or time what they do: they get the machine to themselves, one file after another. */
const ALONE = ['test/app/window/**/*.test.ts', 'test/app/renderer/analysis-in-worker.test.ts']

const times = { testTimeout: 60_000, hookTimeout: 60_000 }

export default defineConfig({
  root: new URL('..', import.meta.url).pathname,
  plugins: [vue()],
  test: {
    // The last line a machine reads: `N passed, N failed, N skipped`.
    reporters: ['default', './test/plain-count-reporter.ts'],
    projects: [
      {
        extends: true,
        test: { name: 'core', include: ['test/**/*.test.ts'], exclude: ALONE, sequence: { groupOrder: 0 }, ...times },
      },
      {
        extends: true,
        test: { name: 'window', include: ALONE, fileParallelism: false, sequence: { groupOrder: 1 }, ...times },
      },
    ],
  },
})
