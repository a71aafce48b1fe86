import type { Notebook } from '../findings.js';
import type { FillRule, GapRule } from '../layout.js';
import { day, type Grid } from './grid.js';

interface Gap {
  first: number;
  length: number;
}

/**
 * Fills gaps (NaN) no longer than the rule allows, in place, by the named rule; a longer one becomes a problem.
 * `linear`: straight line between the neighbours. `recession`: straight line of the logarithm, as flow falls between storms.
 * `previous`: the last value. `zero`. `seasonalMean`: mean of the same days (± 15) of other years, so that it adds no bias over the years.
 * A gap at either end has one neighbour only: the line rules hold it, `previous` needs one before.
 * @source common practice; the recession rule is the exponential recession of a linear store
 */
export function fillGaps(values: Float64Array, name: string, rule: GapRule | undefined, grid: Grid, notebook: Notebook): void {
  const gaps = gapsOf(values);
  if (gaps.length === 0) return;
  const fill = rule?.fill ?? 'stop';
  const longest = fill === 'stop' ? 0 : (rule?.upToSteps ?? 0);
  const original = Float64Array.from(values);
  let filled = 0;
  for (const gap of gaps) {
    if (gap.length > longest || !fillOne(values, original, gap, fill, grid)) problem(gap, name, fill, longest, grid, notebook);
    else filled += gap.length;
  }
  if (filled === 0) return;
  notebook.note({
    code: 'gap-filled',
    severity: 'warning',
    where: name,
    count: filled,
    seen: `${gaps.length} gaps, ${filled} steps; the first from ${day(grid.startMs + gaps[0].first * grid.stepMs)}`,
    done: `filled by the rule ${fill} (up to ${longest} steps)`,
    settle: 'Choose another rule or a shorter reach in gaps.',
  });
}

function gapsOf(values: Float64Array): Gap[] {
  const gaps: Gap[] = [];
  for (let step = 0; step < values.length; step++) {
    if (!Number.isNaN(values[step])) continue;
    const last = gaps[gaps.length - 1];
    if (last && last.first + last.length === step) last.length += 1;
    else gaps.push({ first: step, length: 1 });
  }
  return gaps;
}

function problem(gap: Gap, name: string, fill: FillRule, longest: number, grid: Grid, notebook: Notebook): void {
  const from = grid.startMs + gap.first * grid.stepMs;
  notebook.problem({
    code: 'gap-too-long',
    path: name,
    step: gap.first,
    expected: longest === 0 ? 'a value in every step' : `gaps of at most ${longest} steps that the rule ${fill} can fill`,
    received: `${gap.length} steps without one from ${day(from)} to ${day(from + (gap.length - 1) * grid.stepMs)}`,
    hint: `Bring the values, name a rule in gaps ({ of: '${name}', fill: …, upToSteps: ${gap.length} }), or end the record before it with grid.to.`,
  });
}

/** False where the rule has nothing to go by. */
function fillOne(values: Float64Array, original: Float64Array, gap: Gap, fill: FillRule, grid: Grid): boolean {
  const before = original[gap.first - 1] ?? NaN;
  const after = original[gap.first + gap.length] ?? NaN;
  if (fill === 'zero') {
    values.fill(0, gap.first, gap.first + gap.length);
    return true;
  }
  for (let offset = 0; offset < gap.length; offset++) {
    const share = (offset + 1) / (gap.length + 1);
    let value: number;
    if (fill === 'previous') value = before;
    else if (fill === 'seasonalMean') value = seasonalMean(original, gap.first + offset, grid);
    else if (Number.isNaN(before) || Number.isNaN(after)) value = Number.isNaN(before) ? after : before;
    else if (fill === 'recession' && before > 0 && after > 0) value = before * (after / before) ** share;
    else value = before + (after - before) * share;
    if (Number.isNaN(value)) return false;
    values[gap.first + offset] = value;
  }
  return true;
}

/** Mean of all values within 15 days of the same time of other years; NaN where there is none. */
function seasonalMean(values: Float64Array, step: number, grid: Grid): number {
  const year = (365.25 * 86_400_000) / grid.stepMs;
  const reach = Math.ceil((15 * 86_400_000) / grid.stepMs);
  let sum = 0;
  let count = 0;
  for (let turn = -Math.floor(step / year) - 1; step + turn * year < values.length + reach; turn++) {
    if (turn === 0) continue;
    const centre = Math.round(step + turn * year);
    for (let index = Math.max(0, centre - reach); index <= Math.min(values.length - 1, centre + reach); index++) {
      if (Number.isNaN(values[index])) continue;
      sum += values[index];
      count += 1;
    }
  }
  return count > 0 ? sum / count : NaN;
}
