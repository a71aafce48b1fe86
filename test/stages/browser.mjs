import { existsSync, readFileSync, rmSync } from 'node:fs';
import { at } from '../../demo-site/tools/paths.mjs';
import { enginesWanted, ensureEngine } from '../browser/config/find.mjs';
import { runNode } from './tally.mjs';

/** Every test/browser/ test in every engine wanted. An engine that is missing and cannot be installed is a failure that says what to do. */
export async function browser(tally) {
  const ready = [];
  for (const engine of enginesWanted()) {
    await tally.check(`${engine} is installed`, () => void ready.push(ensureEngine(engine) && engine));
  }
  for (const engine of ready) await runIn(engine, tally);
}

/** One engine at a time, so that one which does not start costs only its own tests. */
async function runIn(engine, tally) {
  const report = at(`.cache/browser-${engine}.json`);
  rmSync(report, { force: true });
  const { status } = await runNode(
    at('node_modules/@web/test-runner/dist/bin.js'),
    ['--config', 'test/browser/web-test-runner.config.mjs'],
    { quiet: false, env: { BROWSERS: engine, RILLAGE_COUNTS: report } },
  );
  if (!existsSync(report)) return tally.fail(engine, `the test runner ended with status ${status} and wrote no report`);
  const totals = JSON.parse(readFileSync(report, 'utf8'));
  tally.add(totals, `a test in ${engine}`);
  if (totals.skipped > 0) tally.fail(engine, `${totals.skipped} tests were skipped`);
  if (status !== 0 && totals.failed === 0) tally.fail(engine, `the test runner ended with status ${status}`);
}
