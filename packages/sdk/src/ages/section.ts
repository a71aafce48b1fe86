import type { ColumnRun, ColumnSnapshot } from '../contract.js';
import { RillageError } from '../errors.js';
import { thinnedEdges } from './thinnedEdges.js';

/** The storage column through time, as a picture of it needs it: bounded in size and safe to send as JSON. */
export interface Section {
  kind: 'rillage-section';
  version: 1;
  /** ISO instant at which the run's first step begins. */
  start: string;
  stepDays: number;
  /** Steps of the whole run. */
  steps: number;
  /** Kept moments, oldest first. */
  columns: SectionColumn[];
  /** Every outflow of the whole run, mm/day: means over `stepDays` days each, a whole number of steps. */
  flow: { stepDays: number; outflows: Record<string, number[]> };
  /** Whether the data inform how much water lies below the last known boundary. Where they do not, no floor is drawn. */
  storageInformed: boolean;
  /** By tracer, for labels; absent where the caller gave none. */
  units: Record<string, string>;
}

/** The column at the end of one step, in layers from the youngest water downwards. */
export interface SectionColumn {
  step: number;
  /** mm in storage, pre-record water included. */
  storage: number;
  /** mm of water from before the record, below the last layer. */
  preRecordDepth: number;
  /** [R] mm from the top of the column to the lower edge of each layer. */
  bottom: number[];
  /** [R] days, age of the younger edge of each layer. */
  youngest: number[];
  /** [R] days, age of the older edge. Between it and the next layer's younger edge nothing fell. */
  oldest: number[];
  /** By tracer: [R] mean concentration of each layer. */
  concentration: Record<string, number[]>;
  /** By outflow: [R] Ω, the share of the outflow drawn from this lower edge upwards. */
  selection: Record<string, number[]>;
  /** By outflow: mm/day in this step. */
  flow: Record<string, number>;
}

export interface SectionOptions {
  /** Most moments kept, evenly chosen among the run's snapshots. 2 to 1200; default 600. */
  columns?: number;
  /** Most layers a column; neighbours are joined where it holds more. 8 to 400; default 96. */
  rows?: number;
  /** Default true. */
  storageInformed?: boolean;
  /** By tracer. */
  units?: Record<string, string>;
}

/**
 * The section of a run that kept snapshots: each column's layers in depth with the age of their edges, their concentrations, and the share
 * of each outflow drawn from above each edge. Layers joined to keep within `rows` keep their water and solute exactly: depths add,
 * concentrations are depth-weighted means Σ c·d / Σ d, Ω is that of the lower edge.
 * @param run  a run with `snapshotsAt`, see {@link sectionSteps}
 * @returns    depths to 0.001 mm, ages to 0.001 days, Ω to 1e-6, concentrations to six digits of the greatest
 * @throws RillageError 'section-empty' without snapshots, 'section-size' where a bound is no whole number or out of its range
 */
export function makeSection(run: ColumnRun, options: SectionOptions = {}): Section {
  const columns = bounded('columns', options.columns ?? 600, 2, 1200);
  const rows = bounded('rows', options.rows ?? 96, 8, 400);
  const kept = [...run.snapshots.values()].sort((a, b) => a.step - b.step);
  if (kept.length === 0) {
    throw new RillageError({
      code: 'section-empty',
      path: 'run.snapshots',
      expected: 'at least one snapshot',
      received: 'none',
      hint: 'Run the column with snapshotsAt: sectionSteps(steps, 600).',
    });
  }
  const digits = concentrationDigits(kept);
  return {
    kind: 'rillage-section',
    version: 1,
    start: run.start,
    stepDays: run.stepDays,
    steps: run.steps,
    columns: sectionSteps(kept.length, columns).map((index) => columnOf(run, kept[index], rows, digits)),
    flow: flowsOf(run),
    storageInformed: options.storageInformed ?? true,
    units: { ...options.units },
  };
}

/**
 * Which of a number of steps to keep for a section: evenly spaced, the first and the last among them, each once.
 * @returns  at most `most` increasing indices, from 0 to steps − 1; for `RunOptions.snapshotsAt`
 */
export function sectionSteps(steps: number, most = 600): number[] {
  if (steps <= most) return Array.from({ length: Math.max(0, steps) }, (_, index) => index);
  if (most < 2) return most < 1 ? [] : [steps - 1];
  return Array.from({ length: most }, (_, index) => Math.round((index * (steps - 1)) / (most - 1)));
}

function columnOf(run: ColumnRun, snapshot: ColumnSnapshot, rows: number, digits: Record<string, number>): SectionColumn {
  const { depth, youngestAge, oldestAge } = snapshot;
  const ends = thinnedEdges(depth, oldestAge, rows);
  const column: SectionColumn = {
    step: snapshot.step,
    storage: round(snapshot.storage, 1e3),
    preRecordDepth: round(snapshot.preRecordDepth, 1e3),
    bottom: new Array<number>(ends.length),
    youngest: new Array<number>(ends.length),
    oldest: new Array<number>(ends.length),
    concentration: {},
    selection: {},
    flow: {},
  };
  let bottom = 0;
  let next = 0;
  for (let row = 0; row < ends.length; row++) {
    column.youngest[row] = round(youngestAge[next], 1e3);
    for (; next < ends[row]; next++) bottom += depth[next];
    column.bottom[row] = round(bottom, 1e3);
    column.oldest[row] = round(oldestAge[next - 1], 1e3);
  }
  for (const name of Object.keys(snapshot.concentration)) {
    column.concentration[name] = means(snapshot.concentration[name], depth, ends, digits[name]);
  }
  for (const name of Object.keys(snapshot.selection)) {
    column.selection[name] = ends.map((end) => round(snapshot.selection[name][end - 1], 1e6));
    column.flow[name] = round(run.outflows[name].flow[snapshot.step], 1e4);
  }
  return column;
}

/** Depth-weighted; the plain value of the first where a layer has no depth left. */
function means(values: Float64Array, depth: Float64Array, ends: readonly number[], scale: number): number[] {
  let next = 0;
  return ends.map((end) => {
    const first = values[next];
    let mass = 0;
    let water = 0;
    for (; next < end; next++) {
      mass += values[next] * depth[next];
      water += depth[next];
    }
    return round(water > 0 ? mass / water : first, scale);
  });
}

const MOST_FLOWS = 4000;

function flowsOf(run: ColumnRun): Section['flow'] {
  const steps = Math.max(1, Math.ceil(run.steps / MOST_FLOWS));
  const outflows: Record<string, number[]> = {};
  for (const [name, { flow }] of Object.entries(run.outflows)) {
    outflows[name] = Array.from({ length: Math.ceil(run.steps / steps) }, (_, bin) => {
      const within = flow.subarray(bin * steps, (bin + 1) * steps);
      return round(within.reduce((sum, value) => sum + value, 0) / within.length, 1e4);
    });
  }
  return { stepDays: steps * run.stepDays, outflows };
}

/** By tracer: the power of ten that leaves six digits of the greatest concentration. */
function concentrationDigits(kept: readonly ColumnSnapshot[]): Record<string, number> {
  const scale: Record<string, number> = {};
  for (const name of Object.keys(kept[0].concentration)) {
    let greatest = 0;
    for (const { concentration } of kept) for (const value of concentration[name]) greatest = Math.max(greatest, Math.abs(value));
    scale[name] = greatest > 0 ? 10 ** (5 - Math.floor(Math.log10(greatest))) : 1;
  }
  return scale;
}

const round = (value: number, scale: number): number => Math.round(value * scale) / scale;

function bounded(name: string, value: number, low: number, high: number): number {
  if (Number.isInteger(value) && value >= low && value <= high) return value;
  throw new RillageError({
    code: 'section-size',
    path: `options.${name}`,
    expected: `a whole number from ${low} to ${high}`,
    received: String(value),
  });
}
