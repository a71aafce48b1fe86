/**
 * Whether intervals mean what they say: `npm run calibration`. Writes its results beside this file. On two cores about twenty minutes for
 * each study. `--only=column` or `--only=coverage` runs one, `--repeats=N` changes how often.
 */
import { fork } from 'node:child_process';
import { availableParallelism } from 'node:os';
import { writeFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import * as column from './column.mjs';
import * as coverage from './coverage.mjs';
import { chiSquareUniform, kolmogorovSmirnov, rankCounts } from './ranks.mjs';

const studies = {
  column: { one: column.rankColumn, repeats: 200, judge: judgeRanks },
  coverage: { one: coverage.coverColumn, repeats: 24, judge: judgeCoverage },
};
const here = fileURLToPath(import.meta.url);

if (process.send) await work();
else {
  const { values } = parseArgs({ options: { only: { type: 'string' }, repeats: { type: 'string' } } });
  for (const [name, study] of Object.entries(studies)) {
    if (values.only && values.only !== name) continue;
    const found = await shareOut(name, values.repeats ? Number(values.repeats) : study.repeats);
    const result = study.judge(found);
    await writeFile(
      new URL(`${name}.json`, import.meta.url),
      `${JSON.stringify({ ...result, found }, null, 1).replace(/\n {3,}/g, ' ')}\n`,
    );
    if (!result.holds) process.exitCode = 1;
  }
}

/** Takes numbers from the parent until there are no more. */
async function work() {
  process.on('message', async ({ study, repeat }) => process.send(await studies[study].one(repeat)));
  process.send('ready');
  await new Promise((done) => process.once('disconnect', done));
}

/** Each worker process asks for the next number when it has answered the last. */
async function shareOut(study, repeats) {
  const found = [];
  let next = 1;
  await Promise.all(
    Array.from(
      { length: Math.min(availableParallelism(), repeats) },
      () =>
        new Promise((done, failed) => {
          const child = fork(here);
          child.on('error', failed);
          child.on('exit', (code) => (code ? failed(new Error(`a worker ended with ${code}`)) : done()));
          child.on('message', (message) => {
            if (message !== 'ready') {
              found.push(message);
              console.log(`${study} ${found.length} of ${repeats}: ${JSON.stringify(message)}`);
            }
            if (next <= repeats) child.send({ study, repeat: next++ });
            else child.disconnect();
          });
        }),
    ),
  );
  return found.sort((a, b) => (a.repeat ?? a.noiseSeed) - (b.repeat ?? b.noiseSeed));
}

/** Ranks are uniform unless a test at 0.1 % says otherwise; a sound fit fails so for about 1 % of the seeds, and the seeds are fixed. */
function judgeRanks(found) {
  const rows = column.QUANTITIES.map((quantity, j) => {
    const ranks = found.map((one) => one.ranks[j]);
    const counts = rankCounts(ranks, column.DRAWS, 10);
    return {
      quantity,
      counts,
      pChiSquare: Number(chiSquareUniform(counts).p.toPrecision(3)),
      pKolmogorov: Number(kolmogorovSmirnov(ranks.map((rank) => (rank + 0.5) / (column.DRAWS + 1))).p.toPrecision(3)),
    };
  });
  const converged = found.filter((one) => one.converged).length;
  const holds = converged === found.length && rows.every(({ pChiSquare, pKolmogorov }) => Math.min(pChiSquare, pKolmogorov) > 0.001);
  console.table(rows.map((row) => ({ ...row, counts: row.counts.join(' ') })));
  return { about: 'simulation-based calibration, Talts et al. (2018)', repeats: found.length, converged, holds, rows };
}

/** The bar: the truth in the 90 % range for 80 to 100 % of the noises. */
function judgeCoverage(found) {
  const rows = coverage.QUANTITIES.map((quantity, j) => {
    const inside = found.filter((one) => one.inside[j]).length;
    return { quantity, inside, of: found.length, share: Number((inside / found.length).toFixed(3)) };
  });
  const converged = found.filter((one) => one.converged).length;
  console.table(rows);
  return {
    about: 'truth within the 5 to 95 % of the fit, other laboratory errors on the same water',
    converged,
    holds: converged === found.length && rows.every(({ share }) => share >= 0.8),
    rows,
  };
}
