import { writeFileSync } from 'node:fs';

/** Writes `{ passed, failed, skipped }` over all files and engines as JSON to a path. A file that could not run counts as one failure. */
export function countsReporter(path) {
  return {
    onTestRunFinished({ sessions }) {
      const totals = { passed: 0, failed: 0, skipped: 0 };
      for (const session of sessions) {
        const before = totals.failed;
        if (session.testResults) addSuite(totals, session.testResults);
        if (!session.passed && totals.failed === before) totals.failed += 1;
      }
      if (path) writeFileSync(path, JSON.stringify(totals));
    },
  };
}

function addSuite(totals, suite) {
  for (const test of suite.tests) {
    if (test.skipped) totals.skipped += 1;
    else if (test.passed) totals.passed += 1;
    else totals.failed += 1;
  }
  for (const inner of suite.suites) addSuite(totals, inner);
}
