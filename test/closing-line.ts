// Ends a run with one plain line, alone: "N passed, N failed". A file that can't even be loaded counts as one failure.

import type { Reporter, TestModule, TestRunEndReason } from "vitest/node";

export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[], reason: TestRunEndReason): void {
    let passed = 0;
    let failed = errors.length;
    for (const module of modules) {
      const tests = [...module.children.allTests()];
      passed += tests.filter((test) => test.result().state === "passed").length;
      const failures = tests.filter((test) => test.result().state === "failed").length;
      failed += failures === 0 && module.state() === "failed" ? 1 : failures;
    }
    if (reason === "interrupted" && failed === 0) failed = 1;
    process.stdout.write(`\n${passed} passed, ${failed} failed\n`);
  }
}
