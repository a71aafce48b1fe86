import { fitCatchment, readForcing } from '@rillage/sdk';
import { makeStationFiles, makeStationTruth, STATIONS } from '../../demo-site/data/generate.mjs';
import { problemOf } from '../../demo-site/service/fit-station.mjs';
import { recordFiles, recordLayout } from '../../demo-site/service/thessle-brook.mjs';

export const QUANTITIES = ['younger than 7 days', 'younger than 30 days', 'younger than 90 days', 'younger than 365 days', 'median age'];

const station = STATIONS['thessle-brook'];
let made;

/**
 * The invented catchment fitted to other laboratory errors on the same water: whether today's true shares and median lie in the 5 to 95 %
 * of the fit, and where. One catchment (the form the data were made with, all its parameters unknown) under one filling of the days
 * between bulk samples, with the doubt about those days in the draws; the other alternatives of the demo weigh next to nothing.
 * @param {number} noiseSeed
 */
export async function coverColumn(noiseSeed) {
  made ??= makeStationTruth(station);
  const files = makeStationFiles(station, made, noiseSeed);
  const read = readForcing(
    recordFiles.map((name) => ({ name, text: files[name] })),
    recordLayout,
  );
  const problem = problemOf(read);
  delete problem.otherCatchments;
  problem.fillings = problem.fillings.filter(({ rule }) => rule === 'seasonalPlusResidual');
  const fit = await fitCatchment(problem, { seed: noiseSeed, workers: 0, effectiveSize: 200, rHat: 1.02, draws: 200 });
  const truth = JSON.parse(files['truth.json']);
  const today = truth.medianDays.length - 1 - truth.daysAfter;
  const { younger, medianDays } = fit.alternatives[0].ages;
  const rows = [
    ...[7, 30, 90, 365].map((days) => ({ truth: truth.younger[days][today], range: younger[days] })),
    { truth: truth.medianDays[today], range: medianDays },
  ];
  return {
    noiseSeed,
    converged: fit.converged,
    evaluations: fit.evaluations,
    inside: rows.map(({ truth, range }) => truth >= range[0] && truth <= range[2]),
    rows: rows.map(({ truth, range }) => [truth, ...range].map((x) => Number(x.toPrecision(5)))),
  };
}
