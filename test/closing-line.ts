import type { Reporter, TestModule } from 'vitest/node'

/** Closes a run with one plain line, `N passed, N failed`, which any build server can read. */
export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[]): void {
    const count = { passed: 0, failed: errors.length, skipped: 0 }
    for (const module of modules) {
      if (module.state() === 'failed' && [...module.children.allTests()].every((test) => test.result().state !== 'failed')) count.failed += 1
      for (const test of module.children.allTests()) {
        const state = test.result().state
        if (state === 'passed') count.passed += 1
        else if (state === 'failed') count.failed += 1
        else count.skipped += 1
      }
    }
    const skipped = count.skipped === 0 ? '' : `, ${count.skipped} skipped`
    process.stdout.write(`\n${count.passed} passed, ${count.failed} failed${skipped}\n`)
  }
}
