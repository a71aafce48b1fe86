/**
 * Browser tests: every test/browser/**\/*.test.ts, in the engines that BROWSERS names (chromium by default), against the built packages.
 * One file: `npm run build && npx web-test-runner --config test/browser/web-test-runner.config.mjs --files test/browser/x.test.ts`.
 */
import { esbuildPlugin } from '@web/dev-server-esbuild';
import { defaultReporter } from '@web/test-runner';
import { a11ySnapshotPlugin } from '@web/test-runner-commands/plugins';
import { at } from '../../demo-site/tools/paths.mjs';
import { badAnswers } from './config/bad-answers.mjs';
import { emulateCommand, screenshotCommand, viewportCommand } from './config/commands.mjs';
import { countsReporter } from './config/counts.mjs';
import { enginesWanted } from './config/find.mjs';
import { launchers, webkitHost } from './config/launchers.mjs';
import { strictPolicy } from './config/strict-policy.mjs';

const engines = enginesWanted();

export default {
  rootDir: at('.'),
  files: ['test/browser/**/*.test.ts'],
  hostname: '127.0.0.1',
  nodeResolve: { exportConditions: ['browser', 'production'], browser: true },
  browsers: await Promise.all(engines.map((name) => launchers[name]())),
  concurrentBrowsers: 1,
  concurrency: 1,
  browserStartTimeout: 60_000,
  testsStartTimeout: 60_000,
  testsFinishTimeout: 180_000,
  testFramework: { config: { timeout: 20_000 } },
  plugins: [
    esbuildPlugin({ ts: true, target: 'es2022' }),
    a11ySnapshotPlugin(),
    emulateCommand(),
    viewportCommand(),
    screenshotCommand(),
    ...(engines.includes('webkit') ? [webkitHost()] : []),
  ],
  middleware: [strictPolicy, badAnswers],
  reporters: [defaultReporter({ reportTestResults: true, reportTestProgress: false }), countsReporter(process.env.RILLAGE_COUNTS)],
};
