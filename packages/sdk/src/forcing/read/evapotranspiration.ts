import type { Forcing } from '../../contract.js';
import { hargreaves } from '../complete/hargreaves.js';
import { limitByStorage } from '../complete/limitByStorage.js';
import { penmanMonteith, type WeatherDay } from '../complete/penmanMonteith.js';
import type { Notebook } from '../findings.js';
import type { EvapotranspirationRule, SettledLayout, WeatherName } from '../layout.js';
import type { Grid } from './grid.js';

const WEATHER: readonly WeatherName[] = [
  'dewPoint',
  'humidityMax',
  'humidityMin',
  'humidityMean',
  'windSpeed',
  'sunshine',
  'solarRadiation',
];
const DAY = 86_400_000;

/** Adds the outflow that the layout asks for, from the weather on the forcing's steps. */
export function addEvapotranspiration(
  forcing: Forcing,
  record: ReadonlyMap<string, Float64Array>,
  grid: Grid,
  layout: SettledLayout,
  notebook: Notebook,
): void {
  const rule = layout.evapotranspiration!;
  const tmin = record.get('tmin');
  const tmax = record.get('tmax');
  const where = `outflows.${rule.as}`;
  if (!tmin || !tmax)
    notebook.problem({
      code: 'series-missing',
      path: where,
      expected: 'columns that hold tmin and tmax',
      received: [...record.keys()].join(', '),
    });
  if (layout.latitude === null)
    notebook.problem({ code: 'layout-unsettled', path: 'latitude', expected: 'degrees north', received: 'none' });
  if (rule.method === 'penmanMonteith' && layout.altitude === null)
    notebook.problem({ code: 'layout-unsettled', path: 'altitude', expected: 'metres above sea level', received: 'none' });
  if (grid.stepMs !== DAY)
    notebook.problem({
      code: 'steps-not-daily',
      path: where,
      expected: 'steps of one day',
      received: `${forcing.stepDays} days`,
      hint: 'Both methods are made for days.',
    });
  if (forcing.outflows[rule.as])
    notebook.problem({ code: 'series-twice', path: where, expected: 'a column or a method', received: 'both' });
  notebook.stopIfAny();
  const potential = potentialOf(rule, { record, tmin: tmin!, tmax: tmax! }, grid, layout);
  notebook.note({
    code: 'evapotranspiration-estimated',
    severity: 'note',
    where,
    seen: 'no measured evapotranspiration',
    done: `estimated by FAO-56 (${rule.method}), times ${rule.factor}${estimatedWeather(rule, record)}`,
  });
  if (rule.limit === null) {
    forcing.outflows[rule.as] = potential;
    return;
  }
  const { actual } = limitByStorage(potential, forcing.inflow, forcing.stepDays, rule.limit);
  const total = (series: Float64Array): number => series.reduce((sum, value) => sum + value, 0) * forcing.stepDays;
  notebook.note({
    code: 'evapotranspiration-limited',
    severity: 'note',
    where,
    seen: `${Math.round(total(potential))} mm wanted`,
    done: `limited to ${Math.round(total(actual))} mm by water in a root zone of ${rule.limit.capacity} mm`,
  });
  forcing.outflows[rule.as] = actual;
}

function potentialOf(
  rule: EvapotranspirationRule,
  { record, tmin, tmax }: { record: ReadonlyMap<string, Float64Array>; tmin: Float64Array; tmax: Float64Array },
  grid: Grid,
  layout: SettledLayout,
): Float64Array {
  const given = WEATHER.filter((name) => record.has(name));
  const tmean = record.get('tmean');
  return tmin.map((low, step) => {
    const base = {
      tmin: low,
      tmax: tmax[step],
      latitude: layout.latitude!,
      dayOfYear: dayOfYear(grid.startMs + (step + 0.5) * grid.stepMs),
    };
    if (rule.method === 'hargreaves') return rule.factor * hargreaves(tmean ? { ...base, tmean: tmean[step] } : base);
    const day: WeatherDay = { ...base, altitude: layout.altitude! };
    for (const name of given) day[name] = record.get(name)![step];
    return rule.factor * penmanMonteith(day);
  });
}

function estimatedWeather(rule: EvapotranspirationRule, record: ReadonlyMap<string, Float64Array>): string {
  if (rule.method !== 'penmanMonteith') return '';
  const estimated = [
    record.has('windSpeed') ? null : 'wind 2 m/s',
    record.has('solarRadiation') || record.has('sunshine') ? null : 'radiation from the range of temperature',
    ['dewPoint', 'humidityMax', 'humidityMean'].some((name) => record.has(name)) ? null : 'dew point equal to tmin',
  ].filter((text) => text !== null);
  return estimated.length > 0 ? `; ${estimated.join(', ')} assumed` : '';
}

/** 1 on 1 January UTC. */
export function dayOfYear(ms: number): number {
  return Math.floor((ms - Date.UTC(new Date(ms).getUTCFullYear(), 0, 1)) / DAY) + 1;
}
