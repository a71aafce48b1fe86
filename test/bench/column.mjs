import { runColumn, resumeColumn } from '@rillage/sdk';
import { benchCatchment, benchOptions, syntheticForcing } from './forcing.mjs';
import { farthest, measure, rangeOf } from './measure.mjs';
import { runYardstick } from './yardstick.mjs';

const cut = (forcing, from, to) => ({
  start: new Date(Date.parse(forcing.start) + from * forcing.stepDays * 86400000).toISOString(),
  stepDays: forcing.stepDays,
  inflow: forcing.inflow.slice(from, to),
  outflows: Object.fromEntries(Object.entries(forcing.outflows).map(([name, flux]) => [name, flux.slice(from, to)])),
  inflowConcentration: Object.fromEntries(Object.entries(forcing.inflowConcentration).map(([name, list]) => [name, list.slice(from, to)])),
});

/** Rows of the accuracy and cost table: what, measured, target, and whether it holds. */
export function benchColumn() {
  const rows = [];
  const row = (what, measured, target, holds) => rows.push({ what, measured, target, holds });
  const forcing = syntheticForcing();
  const steps = forcing.inflow.length;

  let run;
  const time = measure(() => (run = runColumn(benchCatchment, forcing, benchOptions)), 15);
  let exact;
  const everyAge = measure(() => (exact = runColumn(benchCatchment, forcing, { ...benchOptions, ageResolution: 0 })), 1);
  const yardstick = runYardstick(forcing, benchCatchment);

  const closure = Math.max(run.closure.water, run.closure.tracers.d18O, exact.closure.water, exact.closure.tracers.d18O);
  row('water and tracer closure, 20 years, both modes', closure.toExponential(1), '≤ 1e-10 of throughput', closure <= 1e-10);
  let worst = 0;
  for (const name of Object.keys(forcing.outflows)) {
    for (const age of benchOptions.youngerThan) {
      worst = Math.max(worst, farthest(run.outflows[name].youngerShare.get(age), exact.outflows[name].youngerShare.get(age)));
    }
  }
  row('share younger than 7, 30, 90, 365 days, default against every age', worst.toExponential(1), '≤ 1e-3', worst <= 1e-3);
  const off =
    farthest(run.outflows.discharge.concentration.d18O, exact.outflows.discharge.concentration.d18O) /
    rangeOf(forcing.inflowConcentration.d18O);
  row('stream concentration, default against every age', `${(100 * off).toFixed(3)} % of range`, '≤ 0.1 %', off <= 1e-3);
  if (yardstick !== null) {
    const out = exact.outflows.discharge;
    const apart = Math.max(
      ...benchOptions.youngerThan.map((age, index) => Math.abs(out.youngerShare.get(age)[steps - 1] - yardstick.shares[index])),
      Math.abs(out.concentration.d18O[steps - 1] - yardstick.concentration),
    );
    row('last day, every age against the C yardstick (one midpoint step a day)', apart.toExponential(1), '≤ 1e-2', apart <= 1e-2);
  }
  row(
    '20 daily years, default mode',
    `${time.median.toFixed(1)} ms (${time.low.toFixed(1)} to ${time.high.toFixed(1)})`,
    'about 30 ms',
    time.median <= 33,
  );
  row('20 daily years, every age kept', `${(everyAge.median / 1000).toFixed(2)} s`, '', true);
  if (yardstick !== null) {
    const ratio = (1000 * yardstick.seconds) / time.median;
    row('C yardstick, every age', `${yardstick.seconds.toFixed(3)} s`, '', true);
    row('faster than the C yardstick', `${ratio.toFixed(1)} ×`, '≥ 30 ×, aim 100 ×', ratio >= 30);
  }

  const hourly = syntheticForcing({ stepDays: 1 / 24 });
  let hourlyRun;
  const hourlyTime = measure(() => (hourlyRun = runColumn(benchCatchment, hourly, benchOptions)), 1);
  const ratio = hourlyTime.median / time.median;
  row('20 hourly years against daily', `${ratio.toFixed(1)} × (${(hourlyTime.median / 1000).toFixed(2)} s)`, '≤ 25 ×', ratio <= 25);
  row(
    'parcels at most, daily and hourly',
    `${run.parcels.most}, ${hourlyRun.parcels.most}`,
    'flat in the steps',
    hourlyRun.parcels.most < 5 * run.parcels.most,
  );

  const oneDay = (years) => {
    const record = syntheticForcing({ years });
    const n = record.inflow.length - 1;
    const checkpoint = runColumn(benchCatchment, cut(record, 0, n), {}).checkpoint();
    const day = cut(record, n, n + 1);
    return measure(() => resumeColumn(checkpoint, day, benchOptions).checkpoint(), 60).median;
  };
  const short = oneDay(5);
  const long = oneDay(20);
  row(
    'one day more, after 5 and after 20 years',
    `${short.toFixed(2)} ms, ${long.toFixed(2)} ms`,
    'independent of the record',
    long <= 2 * short + 0.3,
  );
  return rows;
}
