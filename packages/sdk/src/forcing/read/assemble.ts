import type { Forcing, Sample } from '../../contract.js';
import { degreeDaySnow, type SnowRun } from '../complete/degreeDaySnow.js';
import type { Notebook } from '../findings.js';
import type { SettledLayout } from '../layout.js';
import { fillRainConcentration, type RainFill } from '../rain/fillRainConcentration.js';
import { addEvapotranspiration } from './evapotranspiration.js';
import { fillGaps } from './gaps.js';
import { gridOver, ontoGrid, type Grid } from './grid.js';
import { mergePieces } from './merge.js';
import type { Pieces } from './series.js';

/** One series with the name that findings and rules use. */
export interface NamedPieces {
  name: string;
  holds: string;
  pieces: Pieces;
}

export interface Assembled {
  forcing: Forcing;
  /** By name: every series on the forcing's steps, before snow: `precipitation`, `tmin`, … */
  record: Map<string, Float64Array>;
  /** By name, where anything was: 1 in the steps of `record` that a gap rule filled. */
  filled: Map<string, Uint8Array>;
  snow: SnowRun | null;
  rainFills: Map<string, RainFill>;
}

/** Series and rain samples → the forcing, completed as the layout asks. Problems end it in one batch. */
export function assemble(
  series: readonly NamedPieces[],
  rainSamples: readonly Sample[],
  layout: SettledLayout,
  notebook: Notebook,
): Assembled {
  const merged = mergePieces(series, notebook);
  const has = (holds: string): boolean => merged.some((each) => each.holds === holds);
  if (has('precipitation') === has('inflow')) {
    notebook.problem({
      code: has('inflow') ? 'series-twice' : 'series-missing',
      path: 'inflow',
      expected: 'a column that holds precipitation, or one that holds inflow',
      received: has('inflow') ? 'both' : 'neither',
      hint: 'Precipitation passes through the snow store, if there is one; inflow reaches storage as it is.',
    });
  }
  notebook.stopIfAny();
  const grid = gridOver(
    merged.map(({ pieces }) => pieces),
    layout,
    notebook,
  );
  const record = new Map<string, Float64Array>();
  const filled = new Map<string, Uint8Array>();
  for (const { name, pieces } of merged) {
    const { values, resampled } = ontoGrid(pieces, grid);
    noteResampled(pieces.where, resampled, notebook);
    const gaps = Uint8Array.from(values, (value) => (Number.isNaN(value) ? 1 : 0));
    if (gaps.includes(1)) filled.set(name, gaps);
    fillGaps(
      values,
      name,
      layout.gaps.find(({ of }) => of === name),
      grid,
      notebook,
    );
    record.set(name, values);
  }
  notebook.stopIfAny();
  return { ...complete(merged, record, rainSamples, grid, layout, notebook), filled };
}

function complete(
  merged: readonly NamedPieces[],
  record: Map<string, Float64Array>,
  rainSamples: readonly Sample[],
  grid: Grid,
  layout: SettledLayout,
  notebook: Notebook,
): Omit<Assembled, 'filled'> {
  const forcing: Forcing = {
    start: new Date(grid.startMs).toISOString(),
    stepDays: layout.grid.stepDays,
    inflow: Float64Array.from(record.get('precipitation') ?? record.get('inflow')!),
    outflows: {},
    inflowConcentration: {},
  };
  for (const { holds, name } of merged) {
    if (holds === 'outflow') forcing.outflows[name] = record.get(name)!;
    if (holds === 'driver') (forcing.drivers ??= {})[name] = record.get(name)!;
  }
  const rainFills = new Map<string, RainFill>();
  for (const tracer of new Set(rainSamples.map((sample) => sample.tracer))) {
    notebook.attempt(
      () => {
        const fill = fillRainConcentration(forcing, rainSamples, { tracer, ...layout.rainConcentration });
        rainFills.set(tracer, fill);
        fill.findings.forEach((finding) => notebook.note(finding));
        noteFill(tracer, layout, notebook);
        forcing.inflowConcentration[tracer] = fill.concentration;
      },
      {},
      undefined,
    );
  }
  notebook.stopIfAny();
  const snow = layout.snow === null ? null : addSnow(forcing, record, layout, notebook);
  if (layout.evapotranspiration !== null) addEvapotranspiration(forcing, record, grid, layout, notebook);
  notebook.stopIfAny();
  return { forcing, record, snow, rainFills };
}

function addSnow(forcing: Forcing, record: ReadonlyMap<string, Float64Array>, layout: SettledLayout, notebook: Notebook): SnowRun | null {
  const temperature = meanTemperature(record);
  if (!temperature || !record.has('precipitation')) {
    notebook.problem({
      code: 'series-missing',
      path: 'snow',
      expected: 'precipitation, and tmean or both tmin and tmax',
      received: [...record.keys()].join(', '),
    });
    return null;
  }
  const run = degreeDaySnow(
    { precipitation: forcing.inflow, temperature, concentration: forcing.inflowConcentration, stepDays: forcing.stepDays },
    layout.snow!,
  );
  const fallen = run.snowfall.reduce((sum, value) => sum + value, 0) * forcing.stepDays;
  notebook.note({
    code: 'snow-store',
    severity: 'note',
    where: 'inflow',
    seen: `${Math.round(fallen)} mm of the precipitation fell at or below the snow threshold`,
    done: `held back by a degree-day store (${layout.snow!.meltFactor} mm per degree and day), with the tracer of what fell`,
  });
  forcing.inflow = run.release;
  forcing.inflowConcentration = run.releaseConcentration;
  return run;
}

/** tmean, or the mean of the extremes. */
export function meanTemperature(record: ReadonlyMap<string, Float64Array>): Float64Array | null {
  const mean = record.get('tmean');
  if (mean) return mean;
  const tmin = record.get('tmin');
  const tmax = record.get('tmax');
  return tmin && tmax ? tmin.map((low, step) => (low + tmax[step]) / 2) : null;
}

function noteResampled(where: string, resampled: number, notebook: Notebook): void {
  if (resampled === 0) return;
  notebook.note({
    code: 'resampled',
    severity: 'note',
    where,
    count: resampled,
    seen: 'intervals that begin or end within a step',
    done: `${resampled} steps are made of parts of intervals, by overlap in time`,
    settle: 'Let dayBegins be the hour at which the gauge is read.',
  });
}

function noteFill(tracer: string, layout: SettledLayout, notebook: Notebook): void {
  const { rule, seed } = layout.rainConcentration;
  notebook.note({
    code: 'rain-concentration',
    severity: 'note',
    where: tracer,
    seen: 'samples of rain over intervals',
    done: `spread over the steps by the rule ${rule}${rule === 'randomRedistribution' ? ` (seed ${seed})` : ''}`,
  });
}
