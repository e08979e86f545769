import type { Reporter, TestModule, TestRunEndReason } from 'vitest/node';

/** Prints the closing line that the automation reads: "12 passed, 0 failed, 1 skipped". */
class CiLine implements Reporter {
  onTestRunEnd(
    modules: readonly TestModule[],
    unhandled: readonly unknown[],
    reason: TestRunEndReason,
  ): void {
    let passed = 0;
    // A file that did not load and an error outside any test are failures too, though no test says so.
    let failed = unhandled.length;
    let skipped = 0;
    for (const module of modules) {
      if (module.state() === 'failed' && module.errors().length > 0) failed += 1;
      for (const test of module.children.allTests()) {
        const state = test.result().state;
        if (state === 'passed') passed += 1;
        else if (state === 'skipped') skipped += 1;
        else failed += 1;
      }
    }
    // A run that broke before its first test, as when the build fails, must not look like a clean one.
    if (failed === 0 && (reason !== 'passed' || passed + skipped === 0)) failed = 1;
    const tail = skipped > 0 ? `, ${String(skipped)} skipped` : '';
    process.stdout.write(`${String(passed)} passed, ${String(failed)} failed${tail}\n`);
  }
}

// The runner loads a reporter given by path through its default export.
// eslint-disable-next-line no-restricted-syntax
export default CiLine;
