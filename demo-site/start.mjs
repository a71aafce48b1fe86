/**
 * The one command for a newcomer: builds, prints today's reading of the invented catchment, serves the demo site on this machine.
 * `--no-serve` stops after the reading; `--watch` builds again when a source changes. PORT sets the first port to try.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync } from 'node:fs';
import { build } from './build.mjs';
import { at } from './tools/paths.mjs';
import { serveFolder } from './tools/static-server.mjs';
import { watchSources } from './tools/watch.mjs';

const serving = !process.argv.includes('--no-serve');
const watching = process.argv.includes('--watch');

if (!(await build({ keepGoing: watching })) && !watching) {
  console.error('\nThe build failed; see above.');
  process.exit(1);
}
const printed = printReading();
if (!serving) process.exit(printed ? 0 : 1);

const server = await serveFolder(publicFolder(), portAsked());
console.log(`\nThe demo site is at http://localhost:${server.address().port}/  (Ctrl+C ends it)`);
if (watching) watchSources(() => build({ keepGoing: true }));
for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => server.close(() => process.exit(0)).closeAllConnections());

function printReading() {
  const script = at('demo-site/service/print-reading.mjs');
  if (!existsSync(script)) {
    console.error('demo-site/service/print-reading.mjs is missing: no reading to print');
    return false;
  }
  console.log('');
  return spawnSync(process.execPath, [script], { stdio: 'inherit', cwd: at('.') }).status === 0;
}

function publicFolder() {
  mkdirSync(at('demo-site/public'), { recursive: true });
  return at('demo-site/public');
}

function portAsked() {
  const asked = Number(process.env.PORT ?? 8080);
  if (Number.isInteger(asked) && asked >= 0 && asked < 65536) return asked;
  console.error(`PORT must be a whole number from 0 to 65535, received ${process.env.PORT}`);
  return process.exit(1);
}
