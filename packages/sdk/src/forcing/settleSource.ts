import type { CellEdit, Holds, SettledColumn, SettledSource, StandsFor, TimeLayout } from './layout.js';
import type { Taker } from './take.js';

export const HOLDS: readonly Holds[] = [
  'precipitation',
  'inflow',
  'outflow',
  'tmin',
  'tmax',
  'tmean',
  'dewPoint',
  'humidityMax',
  'humidityMin',
  'humidityMean',
  'windSpeed',
  'sunshine',
  'solarRadiation',
  'rainTracer',
  'streamTracer',
  'driver',
  'ignored',
];
const STANDS_FOR: readonly StandsFor[] = [
  'instant',
  'meanPreceding',
  'meanFollowing',
  'totalPreceding',
  'totalFollowing',
  'runningTotal',
  'bulk',
];
/** Names that plain objects already answer to, which would make a record keyed by them lie. */
const RESERVED = new Set([...Object.getOwnPropertyNames(Object.prototype), 'prototype']);
const EDIT_KEYS = new Set(['row', 'position', 'value', 'why']);
const NAMED: ReadonlySet<Holds> = new Set<Holds>(['outflow', 'rainTracer', 'streamTracer', 'driver']);

/** One source's layout with its defaults. */
export function settleSource(value: unknown, path: string, take: Taker): SettledSource {
  const source = take.object(value, path);
  const time = settleTime(source['time'], `${path}.time`, take);
  const columns = take
    .list(source['columns'], `${path}.columns`, 10_000)
    .map((column, at) => settleColumn(column, `${path}.columns[${at}]`, take));
  const namesRow = take.whole(source['namesRow'], `${path}.namesRow`, 1, 0, 1000);
  const unitsRow = take.whole(source['unitsRow'], `${path}.unitsRow`, 0, 0, 1000);
  const typesRow = take.whole(source['typesRow'], `${path}.typesRow`, 0, 0, 1000);
  const sampled = columns.every(({ holds }) => holds === 'ignored' || holds === 'streamTracer' || holds === 'rainTracer');
  return {
    name: take.text(source['name'], `${path}.name`, ''),
    splitAt: take.choice(source['splitAt'], `${path}.splitAt`, [',', ';', '\t', '|', 'blanks'], ','),
    decimalMark: take.choice(source['decimalMark'], `${path}.decimalMark`, ['.', ','], '.'),
    groupMark: take.choice(source['groupMark'], `${path}.groupMark`, ['', ',', '.', ' ', "'"], ''),
    remarkMark: take.text(source['remarkMark'], `${path}.remarkMark`, '#', 10),
    namesRow,
    unitsRow,
    typesRow,
    dataFrom: take.whole(source['dataFrom'], `${path}.dataFrom`, Math.max(namesRow, unitsRow, typesRow) + 1, 1, 1_000_000),
    table: take.choice(source['table'], `${path}.table`, ['rows', 'months'], 'rows'),
    time,
    everyDays:
      source['everyDays'] === undefined && !sampled ? 1 : take.numberOrNull(source['everyDays'], `${path}.everyDays`, 1 / 86_400, 400),
    longRows: take.choice(source['longRows'], `${path}.longRows`, ['refuse', 'skip'], 'refuse'),
    repeatedTime: take.choice(source['repeatedTime'], `${path}.repeatedTime`, ['refuse', 'first', 'last'], 'refuse'),
    columns,
    edits: settleEdits(source['edits'], `${path}.edits`, take),
  };
}

/** No cell twice: which of two edits stands must not hang on their order. */
function settleEdits(value: unknown, path: string, take: Taker): CellEdit[] {
  const cells = new Set<string>();
  return take.list(value, path, 1000).map((entry, index) => {
    const at = `${path}[${index}]`;
    const edit = take.object(entry, at);
    for (const key of Object.keys(edit)) {
      if (!EDIT_KEYS.has(key))
        take.issues.push({ code: 'layout-invalid', path: `${at}.${key}`, expected: 'row, position, value and why alone' });
    }
    for (const key of ['row', 'position', 'value']) {
      if (edit[key] === undefined)
        take.issues.push({ code: 'layout-invalid', path: `${at}.${key}`, expected: 'the row, the position and the new text' });
    }
    const row = take.whole(edit['row'], `${at}.row`, 1, 1, 100_000_000);
    const position = take.whole(edit['position'], `${at}.position`, 1, 1, 10_000);
    const cell = `${row} ${position}`;
    if (cells.has(cell)) {
      take.issues.push({ code: 'layout-invalid', path: at, expected: 'one edit a cell', received: `row ${row}, column ${position} again` });
    }
    cells.add(cell);
    return { row, position, value: take.text(edit['value'], `${at}.value`, ''), why: take.text(edit['why'], `${at}.why`, '', 1000) };
  });
}

function settleTime(value: unknown, path: string, take: Taker): TimeLayout {
  const time = take.object(value, path);
  const positions = (key: string): number[] =>
    take.list(time[key], `${path}.${key}`, 6).map((position, index) => take.whole(position, `${path}.${key}[${index}]`, 1, 1, 10_000));
  const columns = positions('columns');
  if (columns.length === 0)
    take.issues.push({ code: 'layout-invalid', path: `${path}.columns`, expected: 'the position of at least one column' });
  return {
    columns,
    from: positions('from'),
    writtenAs: take.textOrNull(time['writtenAs'], `${path}.writtenAs`, 'iso'),
    zone: take.textOrNull(time['zone'], `${path}.zone`, null),
    readAt: take.clock(time['readAt'], `${path}.readAt`, '00:00'),
    lastDayIncluded: take.flag(time['lastDayIncluded'], `${path}.lastDayIncluded`),
    repeatedHour: take.choice(time['repeatedHour'], `${path}.repeatedHour`, ['inOrder', 'first', 'second', 'refuse'], 'inOrder'),
    missingHour: take.choice(time['missingHour'], `${path}.missingHour`, ['refuse', 'shift'], 'refuse'),
  };
}

function settleColumn(value: unknown, path: string, take: Taker): SettledColumn {
  const column = take.object(value, path);
  const holds = take.choice(column['holds'], `${path}.holds`, HOLDS, 'ignored');
  const texts = (key: string): string[] =>
    take.list(column[key], `${path}.${key}`, 50).map((text, index) => take.text(text, `${path}.${key}[${index}]`, '', 60));
  const as = take.text(column['as'], `${path}.as`, holds === 'outflow' ? 'discharge' : '', 100);
  const of = take.text(column['of'], `${path}.of`, 'discharge', 100);
  for (const [key, name] of [
    ['as', as],
    ['of', of],
  ]) {
    if (!RESERVED.has(name)) continue;
    take.issues.push({
      code: 'name-reserved',
      path: `${path}.${key}`,
      expected: 'a name that plain objects do not have',
      received: name,
      hint: 'Choose another name for this series.',
    });
  }
  if (NAMED.has(holds) && as === '') take.issues.push({ code: 'layout-invalid', path: `${path}.as`, expected: `the name of the ${holds}` });
  return {
    position: take.whole(column['position'], `${path}.position`, 1, 1, 10_000),
    name: take.text(column['name'], `${path}.name`, '', 1000),
    holds,
    as,
    unit: take.textOrNull(column['unit'], `${path}.unit`, null),
    standsFor: take.choice(column['standsFor'], `${path}.standsFor`, STANDS_FOR, usualStand(holds)),
    absent: texts('absent'),
    trace: texts('trace'),
    accumulatedMark: take.text(column['accumulatedMark'], `${path}.accumulatedMark`, '', 10),
    accumulates: take.choice(column['accumulates'], `${path}.accumulates`, ['no', 'marked', 'afterGap'], 'no'),
    belowDetection: take.choice(column['belowDetection'], `${path}.belowDetection`, ['refuse', 'limit', 'half', 'zero'], 'refuse'),
    negative: take.choice(column['negative'], `${path}.negative`, ['refuse', 'zero'], 'refuse'),
    daysAcross: take.whole(column['daysAcross'], `${path}.daysAcross`, 1, 1, 31),
    standardError: take.numberOrNull(column['standardError'], `${path}.standardError`, 0),
    of,
  };
}

/** What a value of each kind stands for in a daily file dated by the day itself. */
function usualStand(holds: Holds): StandsFor {
  if (holds === 'precipitation' || holds === 'inflow') return 'totalFollowing';
  return holds === 'rainTracer' ? 'bulk' : holds === 'streamTracer' ? 'instant' : 'meanFollowing';
}
