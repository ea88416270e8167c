import { writeSync } from "node:fs";
import type { Reporter, TestModule } from "vitest/node";

/** Ends a run with one line, `N passed, N failed`; errors outside tests (imports, unhandled) count as failed. */
export default class TallyReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], unhandled: readonly unknown[]): void {
    let passed = 0;
    let failed = unhandled.length;
    let skipped = 0;
    for (const module of modules) {
      failed += module.errors().length;
      for (const suite of module.children.allSuites()) failed += suite.errors().length;
      for (const test of module.children.allTests()) {
        const { state } = test.result();
        if (state === "passed") passed += 1;
        else if (state === "failed") failed += 1;
        else skipped += 1;
      }
    }
    const tail = skipped > 0 ? `, ${skipped} skipped` : "";
    process.once("exit", () => writeSync(1, `\n${passed} passed, ${failed} failed${tail}\n`));
  }
}
