/**
 * Wires the column page: all that is computed is computed here, by the SDK, and handed to the elements. A trial runs ten years of days in a
 * few hundredths of a second; while a slider moves it keeps fewer moments of the column, and all of them once it rests.
 */
import { makeSection, runColumn, sectionSteps } from '../lib/rillage-sdk.min.js';

const ages = [7, 30, 90, 365];
const columns = { moving: 80, resting: 600 };

const record = await (await fetch('./data/thessle-brook-record.json')).json();
const forcing = inFloats(record.forcing);
const steps = forcing.inflow.length;
const last = steps - 1;
const end = new Date(Date.parse(forcing.start) + steps * forcing.stepDays * 86_400_000).toISOString();

const explorer = document.querySelector('#explorer');
document.querySelector('#section').section = trial({ catchment: record.catchment, settled: true }).section;
for (const history of document.querySelectorAll('rillage-age-history')) history.samples = record.samples;
document.querySelector('#tracer').below = record.tracer;
explorer.compute = trial;
explorer.catchment = record.catchment;

/** One run of the model, as the elements take it. */
export function trial({ catchment, settled }) {
  const kept = sectionSteps(steps, settled ? columns.resting : columns.moving);
  const run = runColumn(catchment, forcing, {
    snapshotsAt: kept,
    youngerThan: ages,
    quantiles: [0.5],
    distributionsAt: [last],
    ...(settled ? {} : { ageResolution: 0.15 }),
  });
  const section = makeSection(run, { units: { [record.tracer]: record.unit }, rows: settled ? 96 : 48 });
  const stream = run.outflows.discharge;
  return { section, distribution: distributionOf(stream), history: historyOf(stream) };
}

function distributionOf(stream) {
  const { ageDays, youngerShare } = stream.distributions.get(last);
  return {
    of: 'discharge',
    at: end,
    ageDays,
    youngerShare,
    low: null,
    high: null,
    preRecordShare: stream.preRecordShare[last],
    preRecordRange: null,
    recordDays: steps * forcing.stepDays,
  };
}

function historyOf(stream) {
  const list = (series) => Array.from(series, (value) => (Number.isNaN(value) ? null : value));
  const median = stream.quantiles.get(0.5);
  return {
    start: forcing.start,
    stepDays: forcing.stepDays,
    flow: list(stream.flow),
    younger: Object.fromEntries(ages.map((days) => [days, list(stream.youngerShare.get(days))])),
    medianDays: list(median.days),
    medianBeyondRecord: Array.from(median.beyondRecord, (mark) => Number(mark === 1)),
    preRecordShare: list(stream.preRecordShare),
    concentration: Object.fromEntries(Object.entries(stream.concentration).map(([name, series]) => [name, list(series)])),
  };
}

function inFloats({ inflow, outflows, inflowConcentration, ...rest }) {
  const byName = (series) => Object.fromEntries(Object.entries(series).map(([name, values]) => [name, Float64Array.from(values)]));
  return { ...rest, inflow: Float64Array.from(inflow), outflows: byName(outflows), inflowConcentration: byName(inflowConcentration) };
}
