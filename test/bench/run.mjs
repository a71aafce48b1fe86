/**
 * `npm run bench`: the accuracy and cost table with its targets, answers checked in the same run. Exits with 1 only where an answer is
 * wrong; a speed that falls short is said. `-- --only=column` or `fit` runs one part.
 */
import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { cpus } from 'node:os';

const only = process.argv.find((word) => word.startsWith('--only='))?.slice(7);
if (!existsSync(fileURLToPath(new URL('../../packages/sdk/dist/index.js', import.meta.url)))) {
  console.error('Run npm run build first: the bench measures what is published.');
  process.exit(1);
}

function print(title, rows) {
  console.log(`\n${title}`);
  const width = (key) => Math.max(...rows.map((row) => String(row[key]).length));
  const [what, measured] = [width('what'), width('measured')];
  for (const row of rows) {
    console.log(`  ${row.holds ? '·' : '×'} ${String(row.what).padEnd(what)}  ${String(row.measured).padEnd(measured)}  ${row.target}`);
  }
}

console.log(`Node ${process.version}, ${cpus().length} × ${cpus()[0].model.trim()}. Times are CPU time, medians.`);
const rows = [];
if (only === undefined || only === 'column') {
  const { benchColumn } = await import('./column.mjs');
  const found = benchColumn();
  print('Column', found);
  rows.push(...found);
}
const fitFile = new URL('fit.mjs', import.meta.url);
if ((only === undefined || only === 'fit') && existsSync(fileURLToPath(fitFile))) {
  const { benchFit } = await import('./fit.mjs');
  const found = await benchFit();
  print('Fit', found);
  rows.push(...found);
}
const short = rows.filter((row) => !row.holds);
console.log(short.length === 0 ? '\nEvery row holds.' : `\n${short.length} of ${rows.length} rows fall short (×).`);
