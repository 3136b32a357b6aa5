import type { Reporter, TestModule } from 'vitest/node';

/** Ends a run with the plain line that any reader of logs understands: `N passed, N failed`. */
export default class SummaryReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[]): void {
    const count = { passed: 0, failed: errors.length, skipped: 0 };
    for (const testModule of modules) {
      if (testModule.errors().length > 0) count.failed++;
      for (const test of testModule.children.allTests()) {
        const { state } = test.result();
        if (state === 'passed') count.passed++;
        else if (state === 'failed') count.failed++;
        else count.skipped++;
      }
    }
    const skipped = count.skipped > 0 ? `, ${count.skipped} skipped` : '';
    console.log(`\n${count.passed} passed, ${count.failed} failed${skipped}`);
  }
}
