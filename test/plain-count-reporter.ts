import type { Reporter, TestModule } from 'vitest/node'

/** Closes a run with `N passed, N failed, N skipped` on a line of its own. */
export default class PlainCountReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], unhandledErrors: readonly unknown[]): void {
    const count = { passed: 0, failed: unhandledErrors.length, skipped: 0 }
    for (const module of modules) {
      // A file that fails before its tests are collected has no test to count.
      if (module.errors().length > 0) count.failed += 1
      for (const test of module.children.allTests()) {
        const { state } = test.result()
        if (state === 'passed') count.passed += 1
        else if (state === 'skipped') count.skipped += 1
        else count.failed += 1
      }
    }
    // After the default reporter's own summary.
    setImmediate(() => console.log(`\n${count.passed} passed, ${count.failed} failed, ${count.skipped} skipped`))
  }
}
