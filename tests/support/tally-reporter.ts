import { writeFileSync } from 'node:fs';
import type { Reporter, SerializedError, TestModule, TestRunEndReason } from 'vitest/node';

export interface Tally {
  passed: number;
  failed: number;
  skipped: number;
  /** What went wrong outside any test: files that do not load, errors nobody caught. */
  troubles: string[];
}

/** Counts what a run did, for the closing line of `npm test`. */
export default class TallyReporter implements Reporter {
  onTestRunEnd(
    modules: ReadonlyArray<TestModule>,
    unhandled: ReadonlyArray<SerializedError>,
    reason: TestRunEndReason,
  ): void {
    const tally: Tally = { passed: 0, failed: 0, skipped: 0, troubles: [] };
    for (const module of modules) {
      let failedHere = 0;
      for (const test of module.children.allTests()) {
        const { state } = test.result();
        if (state === 'passed') tally.passed += 1;
        else if (state === 'skipped') tally.skipped += 1;
        else failedHere += 1;
      }
      tally.failed += failedHere;
      // Files that do not load and hooks that fail are no tests, but they are failures.
      const hooks = [...module.children.allSuites()]
        .filter((suite) => suite.errors().length)
        .map((suite) => `${module.relativeModuleId} > ${suite.fullName}`);
      tally.troubles.push(...hooks);
      const unexplained = !module.ok() && failedHere + hooks.length === 0;
      if (module.errors().length || unexplained) tally.troubles.push(module.relativeModuleId);
    }
    for (const error of unhandled) tally.troubles.push(`unhandled: ${error.message}`);
    if (reason === 'interrupted') tally.troubles.push('the run was interrupted');
    const file = process.env.QUARTZHOLD_TALLY;
    if (file) writeFileSync(file, JSON.stringify(tally));
  }
}
