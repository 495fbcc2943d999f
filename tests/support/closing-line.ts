import type { Reporter, TestModule } from "vitest/node";

/** Ends the run's output with the one line CI reads: `N passed, N failed`. */
export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], unhandledErrors: readonly unknown[]): void {
    let passed = 0;
    let failed = unhandledErrors.length;
    for (const module of modules) {
      // A file that could not be loaded has no tests but has failed all the same.
      if (module.errors().length > 0) failed += 1;
      for (const test of module.children.allTests()) {
        const state = test.result().state;
        if (state === "passed") passed += 1;
        else if (state === "failed") failed += 1;
      }
    }
    process.on("exit", () => process.stdout.write(`${passed} passed, ${failed} failed\n`));
  }
}
