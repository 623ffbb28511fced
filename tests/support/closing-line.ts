import type { Reporter, TestModule } from 'vitest/node';

/** Ends a run with one plain line, `N passed, N failed`, for whatever reads the output. */
export class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], unhandledErrors: readonly unknown[]): void {
    let passed = 0;
    let failed = unhandledErrors.length;
    for (const module of modules) {
      // A file that could not be loaded has no tests that could fail.
      failed += module.errors().length;
      for (const test of module.children.allTests()) {
        const { state } = test.result();
        if (state === 'passed') passed += 1;
        if (state === 'failed') failed += 1;
      }
    }
    // Other reporters and the coverage still print: the line comes last.
    process.once('exit', () => process.stdout.write(`\n${passed} passed, ${failed} failed\n`));
  }
}
