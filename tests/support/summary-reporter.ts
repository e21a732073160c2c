import type { Reporter, TestModule } from 'vitest/node'

/** Closes the run with the line that continuous integration reads: `N passed, N failed`. */
export default class SummaryReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[]): void {
    let passed = 0
    let failed = errors.length
    for (const module of modules) {
      const states = [...module.children.allTests()].map((test) => test.result().state)
      const failures = states.filter((state) => state === 'failed').length
      passed += states.filter((state) => state === 'passed').length
      // A file can fail before any of its tests does: at its import, or in what is done before all of them.
      failed += failures === 0 && module.state() === 'failed' ? 1 : failures
    }
    // Vitest takes a filter that matches nothing for a success.
    if (passed + failed === 0) process.exitCode = 1
    process.stdout.write(`\n${passed} passed, ${failed} failed\n`)
  }
}
