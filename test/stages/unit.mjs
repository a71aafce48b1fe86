import { existsSync, readFileSync, rmSync } from 'node:fs';
import { at } from '../../demo-site/tools/paths.mjs';
import { runNode } from './tally.mjs';

/** Every *.test.ts outside test/browser/, in Node. */
export async function unit(tally) {
  const report = at('.cache/unit.json');
  rmSync(report, { force: true });
  const { status } = await runNode(
    at('node_modules/vitest/vitest.mjs'),
    ['run', '--config', 'test/vitest.config.ts', '--reporter=dot', '--reporter=json', `--outputFile.json=${report}`],
    { quiet: false },
  );
  if (!existsSync(report)) return tally.fail('vitest', 'it wrote no report');
  const { numPassedTests, numFailedTests, numPendingTests, numTodoTests, testResults } = JSON.parse(readFileSync(report, 'utf8'));
  // A file that could not be loaded holds no test that could fail.
  const broken = testResults.filter((file) => file.status === 'failed' && file.assertionResults.every((test) => test.status !== 'failed'));
  tally.add({ passed: numPassedTests, failed: numFailedTests }, 'a unit test');
  for (const file of broken) tally.fail(file.name.replace(at('.'), ''), file.message || 'could not be loaded');
  // Where a file's preparation fails, its tests count as skipped; the file is a failure already.
  if (broken.length === 0 && numPendingTests + numTodoTests > 0)
    tally.fail('skips', `${numPendingTests + numTodoTests} tests were skipped`);
  for (const [name, seconds] of slowest(testResults)) console.log(`  ${seconds.toFixed(1).padStart(6)} s  ${name}`);
  if (status !== 0 && tally.failed === 0) tally.fail('vitest', `ended with status ${status}`);
}

/** Files that take longest, where they take more than a few seconds. */
function slowest(files) {
  return files
    .map((file) => [file.name.replace(at('.'), ''), (file.endTime - file.startTime) / 1000])
    .filter(([, seconds]) => seconds > 5)
    .sort(([, a], [, b]) => b - a)
    .slice(0, 8);
}
