import { throwIfAny } from '../errors.js';
import type { FillRule, Layout, SettledLayout } from './layout.js';
import { settleSource } from './settleSource.js';
import { Taker } from './take.js';
import { DEFAULT_BYTES } from './text/sources.js';

const FILL_RULES: readonly FillRule[] = ['stop', 'zero', 'previous', 'linear', 'recession', 'seasonalMean'];

/**
 * The layout with every default written out: what the receipt keeps. Accepts any plain data and refuses what is no layout.
 * @throws RillageError 'layout-invalid' | 'layout-newer' | 'name-reserved', in one batch
 */
export function settleLayout(layout: Layout): SettledLayout {
  const take = new Taker();
  const given = take.object(layout, 'layout');
  const sources = take.list(given['sources'], 'sources', 50);
  if (sources.length === 0) take.issues.push({ code: 'layout-invalid', path: 'sources', expected: 'the layout of at least one source' });
  if (given['version'] !== undefined && given['version'] !== 1) {
    take.issues.push({
      code: 'layout-newer',
      path: 'version',
      expected: '1',
      received: String(given['version']),
      hint: 'A newer version of the SDK wrote this layout.',
    });
  }
  const settled: SettledLayout = {
    kind: 'rillage-layout',
    version: 1,
    sources: sources.map((source, index) => settleSource(source, `sources[${index}]`, take)),
    grid: settleGrid(given['grid'], take),
    areaKm2: take.numberOrNull(given['areaKm2'], 'areaKm2', 1e-9, 1e9),
    latitude: take.numberOrNull(given['latitude'], 'latitude', -90, 90),
    altitude: take.numberOrNull(given['altitude'], 'altitude', -500, 9000),
    gaps: take.list(given['gaps'], 'gaps', 100).map((rule, index) => settleGap(rule, `gaps[${index}]`, take)),
    rainConcentration: settleRain(given['rainConcentration'], take),
    snow: settleSnow(given['snow'], take),
    evapotranspiration: settleEvapotranspiration(given['evapotranspiration'], take),
    limits: settleLimits(given['limits'], take),
  };
  throwIfAny(take.issues);
  shareZone(settled);
  return settled;
}

/** A zone given once counts for what says nothing of its own. */
function shareZone({ sources, grid }: SettledLayout): void {
  grid.zone ??= sources.find(({ time }) => time.zone !== null)?.time.zone ?? null;
  for (const { time } of sources) time.zone ??= grid.zone;
}

function settleGrid(value: unknown, take: Taker): SettledLayout['grid'] {
  const grid = take.object(value ?? {}, 'grid');
  const stepDays = take.number(grid['stepDays'], 'grid.stepDays', 1, 1 / 1440, 31);
  const minutes = Math.round(stepDays * 1440);
  if (Math.abs(stepDays * 1440 - minutes) > 1e-6 || (minutes < 1440 ? 1440 % minutes : minutes % 1440) !== 0) {
    take.issues.push({
      code: 'layout-invalid',
      path: 'grid.stepDays',
      expected: 'whole minutes that divide a day, or whole days',
      received: String(grid['stepDays']),
    });
  }
  return {
    stepDays,
    dayBegins: take.clock(grid['dayBegins'], 'grid.dayBegins', '00:00'),
    zone: take.textOrNull(grid['zone'], 'grid.zone', null),
    from: take.textOrNull(grid['from'], 'grid.from', null),
    to: take.textOrNull(grid['to'], 'grid.to', null),
  };
}

function settleGap(value: unknown, path: string, take: Taker): SettledLayout['gaps'][number] {
  const rule = take.object(value, path);
  const fill = take.choice(rule['fill'], `${path}.fill`, FILL_RULES, 'stop');
  return { of: take.text(rule['of'], `${path}.of`, ''), fill, upToSteps: take.whole(rule['upToSteps'], `${path}.upToSteps`, 0, 0, 10_000) };
}

function settleRain(value: unknown, take: Taker): SettledLayout['rainConcentration'] {
  const rule = take.object(value ?? {}, 'rainConcentration');
  const path = 'rainConcentration';
  return {
    rule: take.choice(rule['rule'], `${path}.rule`, ['bulkConstant', 'seasonalPlusResidual', 'randomRedistribution'], 'bulkConstant'),
    uncovered: take.choice(rule['uncovered'], `${path}.uncovered`, ['stop', 'amountWeightedMean', 'seasonalCurve'], 'stop'),
    seed: take.whole(rule['seed'], `${path}.seed`, 1, 0, 4294967295),
  };
}

function settleSnow(value: unknown, take: Taker): SettledLayout['snow'] {
  if (value === null || value === undefined) return null;
  const rule = take.object(value, 'snow');
  if (rule['meltFactor'] === undefined)
    take.issues.push({ code: 'layout-invalid', path: 'snow.meltFactor', expected: 'mm of melt per degree and day' });
  const snowBelow = take.number(rule['snowBelow'], 'snow.snowBelow', 0, -20, 20);
  return {
    meltFactor: take.number(rule['meltFactor'], 'snow.meltFactor', 0, 0, 100),
    meltAbove: take.number(rule['meltAbove'], 'snow.meltAbove', 0, -20, 20),
    snowBelow,
    rainAbove: take.number(rule['rainAbove'], 'snow.rainAbove', snowBelow, snowBelow, 20),
  };
}

function settleEvapotranspiration(value: unknown, take: Taker): SettledLayout['evapotranspiration'] {
  if (value === null || value === undefined) return null;
  const path = 'evapotranspiration';
  const rule = take.object(value, path);
  const limit = rule['limit'] === undefined || rule['limit'] === null ? null : take.object(rule['limit'], `${path}.limit`);
  return {
    method: take.choice(rule['method'], `${path}.method`, ['hargreaves', 'penmanMonteith'], 'hargreaves'),
    as: take.text(rule['as'], `${path}.as`, 'evapotranspiration'),
    factor: take.number(rule['factor'], `${path}.factor`, 1, 0, 10),
    limit: limit && {
      capacity: take.number(limit['capacity'], `${path}.limit.capacity`, 100, 1e-6, 1e5),
      stressBegins: take.number(limit['stressBegins'], `${path}.limit.stressBegins`, 0.5, 0, 0.999),
      initialDepletion: take.number(limit['initialDepletion'], `${path}.limit.initialDepletion`, 0, 0, 1e5),
    },
  };
}

function settleLimits(value: unknown, take: Taker): SettledLayout['limits'] {
  const limits = take.object(value ?? {}, 'limits');
  return {
    bytes: take.whole(limits['bytes'], 'limits.bytes', DEFAULT_BYTES, 1, 400_000_000),
    rows: take.whole(limits['rows'], 'limits.rows', 1_500_000, 1, 10_000_000),
    columns: take.whole(limits['columns'], 'limits.columns', 1000, 1, 10_000),
    steps: take.whole(limits['steps'], 'limits.steps', 2_000_000, 1, 10_000_000),
  };
}
