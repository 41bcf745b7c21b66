import type { Reporter, TestModule } from 'vitest/node'

/** Ends the run with one plain line: how many tests passed, failed and were skipped. */
export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[]): void {
    let passed = 0
    let failed = errors.length
    let skipped = 0
    for (const module of modules) {
      if (module.state() === 'failed' && [...module.children.allTests()].length === 0) failed += 1
      for (const test of module.children.allTests()) {
        const state = test.result().state
        if (state === 'passed') passed += 1
        else if (state === 'failed') failed += 1
        else skipped += 1
      }
    }
    // After the default reporter's own summary, so that this is the last line.
    process.on('exit', () =>
      process.stdout.write(`\n${passed} passed, ${failed} failed, ${skipped} skipped\n`),
    )
  }
}
