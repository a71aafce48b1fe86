import type { ColumnLayout, GapRule, Holds, Layout, SourceLayout } from '@rillage/sdk';
import type { ForcingInputKey } from './messages.js';

export type FieldValue = string | number | boolean | null | undefined | string[] | number[];

/** One thing of a layout that a reader may change. */
export interface Field {
  label: Extract<ForcingInputKey, `forcing.${string}`>;
  /** Put into the label: the name of a series. */
  series?: string;
  value: FieldValue;
  /** The layout with another value, undefined where the reader gives none. It is not changed itself. */
  with: (value: FieldValue) => Layout;
  /** `list`: texts between semicolons. Default: a text. */
  kind?: 'number' | 'flag' | 'list' | 'day';
  /** Values to choose from, the first being the default; their words are the messages `is.…`. */
  options?: readonly string[];
  /** Usual answers, where any may be given. */
  usual?: readonly string[];
  /** Without it the record cannot be read. */
  open?: boolean;
}

/** Fields that belong to no file. */
export function recordFields(layout: Layout): Field[] {
  const { grid, evapotranspiration, rainConcentration } = layout;
  const columns = layout.sources.flatMap((source) => source.columns);
  const volumes = columns.some(({ holds, unit }) => flux.test(holds) && volume.test(unit ?? ''));
  const zoned = grid?.zone ?? layout.sources.find(({ time }) => time.zone)?.time.zone;
  const sampled = columns.some(({ holds }) => holds === 'rainTracer');
  const at =
    (...path: string[]) =>
    (value: FieldValue) =>
      setAt(layout, path, value);
  const kind = 'number';
  return [
    ...kept([
      { label: 'forcing.zone', value: grid?.zone, with: at('grid', 'zone'), usual: zones(), open: !zoned },
      { label: 'forcing.areaKm2', value: layout.areaKm2, with: at('areaKm2'), kind, open: volumes && layout.areaKm2 == null },
      { label: 'forcing.from', value: grid?.from, with: at('grid', 'from'), kind: 'day' },
      { label: 'forcing.to', value: grid?.to, with: at('grid', 'to'), kind: 'day' },
      {
        label: 'forcing.method',
        value: evapotranspiration?.method,
        options: ['none', 'hargreaves', 'penmanMonteith'],
        with: (method) =>
          setAt(layout, ['evapotranspiration'], method === 'none' ? null : { as: 'evapotranspiration', ...evapotranspiration, method }),
      },
      !!evapotranspiration && {
        label: 'forcing.factor',
        value: evapotranspiration.factor ?? 1,
        with: at('evapotranspiration', 'factor'),
        kind,
      },
      !!evapotranspiration && {
        label: 'forcing.latitude',
        value: layout.latitude,
        with: at('latitude'),
        kind,
        open: layout.latitude == null,
      },
      evapotranspiration?.method === 'penmanMonteith' && {
        label: 'forcing.altitude',
        value: layout.altitude,
        with: at('altitude'),
        kind,
        open: layout.altitude == null,
      },
      sampled && { label: 'forcing.rule', value: rainConcentration?.rule, with: at('rainConcentration', 'rule'), options: rules },
      sampled && {
        label: 'forcing.uncovered',
        value: rainConcentration?.uncovered,
        with: at('rainConcentration', 'uncovered'),
        options: ['stop', 'amountWeightedMean', 'seasonalCurve'],
      },
    ]),
    ...seriesOf(columns).flatMap((series) => gapFields(layout, series)),
  ];
}

/** Fields of one file but for its columns. */
export function sourceFields(layout: Layout, index: number): Field[] {
  const { decimalMark, time, everyDays, repeatedTime } = layout.sources[index]!;
  const at =
    (...path: string[]) =>
    (value: FieldValue) =>
      setAt(layout, ['sources', index, ...path], value);
  const written = at('time', 'writtenAs');
  const open = time.writtenAs === null;
  const positions = at('time', 'columns');
  return kept([
    {
      label: 'forcing.time',
      value: time.columns.map(String),
      with: (marks) => positions((marks as string[]).map(Number)),
      kind: 'list',
    },
    { label: 'forcing.writtenAs', value: time.writtenAs, with: (value) => written(value ?? null), usual: times, open },
    !!time.from?.length && {
      label: 'forcing.lastDayIncluded',
      value: time.lastDayIncluded,
      with: at('time', 'lastDayIncluded'),
      kind: 'flag',
    },
    { label: 'forcing.readAt', value: time.readAt ?? '00:00', with: at('time', 'readAt') },
    { label: 'forcing.zone', value: time.zone, with: at('time', 'zone'), usual: zones() },
    { label: 'forcing.decimalMark', value: decimalMark, with: at('decimalMark'), options: ['.', ','] },
    everyDays !== null && {
      label: 'forcing.repeatedTime',
      value: repeatedTime,
      with: at('repeatedTime'),
      options: ['refuse', 'first', 'last'],
    },
  ]);
}

/** Fields of one column, those that its kind needs. */
export function columnFields(layout: Layout, index: number, place: number): Field[] {
  const column = layout.sources[index]!.columns[place]!;
  const { holds, standsFor, ...others } = column;
  const path = ['sources', index, 'columns', place];
  const at = (key: keyof ColumnLayout) => (value: FieldValue) => setAt(layout, [...path, key], value);
  const tracer = holds.endsWith('Tracer');
  const used = holds !== 'ignored';
  const flow = flux.test(holds);
  return kept([
    // What a value stands for follows from what it is of, so it is asked anew.
    { label: 'forcing.holds', value: holds, options: kinds, with: (kind) => setAt(layout, path, { ...others, holds: kind }) },
    (tracer || holds === 'outflow' || holds === 'driver') && {
      label: 'forcing.as',
      value: column.as,
      with: at('as'),
      open: !column.as && holds !== 'outflow',
    },
    used && { label: 'forcing.unit', value: column.unit, with: at('unit'), usual: units, open: !column.unit && holds !== 'driver' },
    used && { label: 'forcing.standsFor', value: standsFor ?? usually(holds), with: at('standsFor'), options: stands },
    used && { label: 'forcing.absent', value: column.absent ?? [], with: at('absent'), kind: 'list' },
    tracer && { label: 'forcing.standardError', value: column.standardError, with: at('standardError'), kind: 'number' },
    (flow || holds === 'rainTracer') && {
      label: 'forcing.belowDetection',
      value: column.belowDetection,
      with: at('belowDetection'),
      options: ['refuse', 'limit', 'half', 'zero'],
    },
    flow && { label: 'forcing.negative', value: column.negative, with: at('negative'), options: ['refuse', 'zero'] },
  ]);
}

function gapFields(layout: Layout, series: string): Field[] {
  const all = layout.gaps ?? [];
  const rule = all.find(({ of }) => of === series) ?? { of: series, fill: 'stop', upToSteps: 1 };
  const change = (part: object): Layout => ({
    ...layout,
    gaps: [...all.filter(({ of }) => of !== series), { ...rule, ...part } as GapRule],
  });
  return kept([
    { label: 'forcing.gap', series, value: rule.fill, with: (fill) => change({ fill }), options: fills },
    rule.fill !== 'stop' && {
      label: 'forcing.upTo',
      value: rule.upToSteps,
      with: (steps) => change({ upToSteps: steps ?? 0 }),
      kind: 'number',
    },
  ]);
}

/** Names under which the columns' series are kept, each once; tracers are samples and have no gaps. */
function seriesOf(columns: readonly ColumnLayout[]): string[] {
  const series = columns.filter(({ holds }) => !/Tracer$|^ignored$/.test(holds));
  return [...new Set(series.map(({ holds, as }) => as || (holds === 'outflow' ? 'discharge' : holds)))];
}

/** Plain data with one place set, copied along the way there. */
export function setAt<T>(data: T, [key, ...rest]: readonly (string | number)[], value: unknown): T {
  if (key === undefined) return value as T;
  if (Array.isArray(data)) return data.map((entry: unknown, index) => (index === key ? setAt(entry, rest, value) : entry)) as T;
  const object = (data ?? {}) as Record<string, unknown>;
  return { ...object, [key]: setAt(object[key], rest, value) } as T;
}

/** What the reader has settled, over what is proposed for files that are new; sources in the order of the files. */
export function mergeLayouts(own: Layout | null, proposed: Layout, names: readonly string[]): Layout {
  const settled = new Map<string, SourceLayout>();
  own?.sources.forEach((source, index) => settled.set(source.name || (names[index] ?? ''), source));
  return {
    ...proposed,
    ...own,
    grid: { ...proposed.grid, ...own?.grid },
    sources: names.map((name, index) => settled.get(name) ?? proposed.sources[index]!),
  };
}

const kept = (fields: (Field | false)[]): Field[] => fields.filter((field) => field !== false);

/** As the reader of files takes it where a layout does not say. */
const usually = (holds: Holds): string =>
  holds === 'precipitation' || holds === 'inflow'
    ? 'totalFollowing'
    : holds === 'rainTracer'
      ? 'bulk'
      : holds === 'streamTracer'
        ? 'instant'
        : 'meanFollowing';

const kinds = [
  ...['precipitation', 'inflow', 'outflow', 'tmin', 'tmax', 'tmean', 'rainTracer', 'streamTracer', 'dewPoint', 'humidityMax'],
  ...['humidityMin', 'humidityMean', 'windSpeed', 'sunshine', 'solarRadiation', 'driver', 'ignored'],
];
const stands = ['instant', 'meanPreceding', 'meanFollowing', 'totalPreceding', 'totalFollowing', 'runningTotal', 'bulk'];
const fills = ['stop', 'zero', 'previous', 'linear', 'recession', 'seasonalMean'];
const rules = ['bulkConstant', 'seasonalPlusResidual', 'randomRedistribution'];
const units = ['mm', 'mm/d', 'in', 'm3/s', 'l/s', 'Cel', '[degF]', 'permil', 'mg/L', 'ug/L', 'TU', '%', 'm/s', 'MJ/m2/d', 'h'];
const times = ['iso', 'DD.MM.YYYY', 'DD/MM/YYYY', 'MM/DD/YYYY', 'DD.MM.YYYY hh:mm', 'serial1900', 'serial1904'];
const zones = (): string[] => ['UTC', '+01:00', Intl.DateTimeFormat().resolvedOptions().timeZone];
const flux = /^(precipitation|inflow|outflow)$/;
// A flow as a volume becomes a depth by the area.
const volume = /m3|m³|l\/|ft|cfs|gal/i;
