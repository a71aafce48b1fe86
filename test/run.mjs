/**
 * Runs everything, stage after stage, whatever fails on the way, and ends with one line: `N passed, N failed`.
 * `--verify`: only what a commit must pass. `--only=lint,unit`: only these stages. `--list`: their names.
 * BROWSERS=chromium,firefox,webkit chooses the engines.
 */
import { mkdirSync } from 'node:fs';
import { at } from '../demo-site/tools/paths.mjs';
import { stages } from './stages/index.mjs';
import { Tally } from './stages/tally.mjs';

const flag = (name) => process.argv.find((each) => each === `--${name}` || each.startsWith(`--${name}=`));
if (flag('list')) {
  console.log(stages.map(({ name, verify }) => `${name}${verify ? ' (verify)' : ''}`).join('\n'));
  process.exit(0);
}
const chosen = choose();
mkdirSync(at('.cache'), { recursive: true });

const results = [];
for (const { name, run } of chosen) {
  console.log(`\n== ${name}`);
  const tally = new Tally();
  const began = performance.now();
  await run(tally).catch((reason) => tally.fail(name, reason instanceof Error ? (reason.stack ?? reason.message) : String(reason)));
  if (tally.passed + tally.failed === 0) tally.fail(name, 'the stage checked nothing');
  results.push({ name, tally, seconds: (performance.now() - began) / 1000 });
}

console.log('\n== summary');
for (const { name, tally, seconds } of results) {
  const counts = `${String(tally.passed).padStart(6)} passed ${String(tally.failed).padStart(4)} failed`;
  console.log(`  ${name.padEnd(10)} ${counts} ${seconds.toFixed(1).padStart(7)} s`);
  for (const title of new Set(tally.failures)) console.log(`      FAILED ${title}`);
}
const sum = (key) => results.reduce((total, { tally }) => total + tally[key], 0);
process.exitCode = sum('failed') > 0 ? 1 : 0;
console.log(`${sum('passed')} passed, ${sum('failed')} failed`);

function choose() {
  const only = flag('only')?.split('=')[1]?.split(',');
  if (!only) return flag('verify') ? stages.filter((stage) => stage.verify) : stages;
  const unknown = only.filter((name) => !stages.some((stage) => stage.name === name));
  if (unknown.length === 0) return stages.filter((stage) => only.includes(stage.name));
  console.error(`no stage is called ${unknown.join(', ')}; there are ${stages.map((stage) => stage.name).join(', ')}`);
  return process.exit(1);
}
