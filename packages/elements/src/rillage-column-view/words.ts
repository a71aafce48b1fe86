import { age, ageSpan, moment, number, percent } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { lazyRows } from '../shared/lazy-rows.js';
import { cleanText } from '../shared/text.js';
import { depthOfShare, knownDepth, timeOf } from './geometry.js';
import type { ColumnViewKey } from './messages.js';
import type { SectionData, SectionDataColumn } from './section-type.js';

export type Speech = Language<ColumnViewKey>;

export const millimetres = (speech: Speech, depth: number): string =>
  number(speech.tag, { maximumFractionDigits: depth < 10 ? 1 : 0 }).format(depth);
const rate = (speech: Speech, flow: number): string => number(speech.tag, { maximumSignificantDigits: 2 }).format(flow);

export function outflowName(speech: Speech, name: string): string {
  return name === 'discharge' || name === 'evapotranspiration' ? speech.say(`column.${name}`) : cleanText(name, 40);
}

/** The stream first, then the others as they come. */
export const outflowsOf = (section: SectionData): string[] =>
  Object.keys(section.columns[0]!.selection).sort((a, b) => Number(b === 'discharge') - Number(a === 'discharge'));

export const tracersOf = (section: SectionData): string[] => Object.keys(section.columns[0]!.concentration);

export function tracerName({ units }: SectionData, name: string): string {
  const unit = Object.hasOwn(units, name) ? cleanText(units[name], 20) : '';
  return unit ? `${cleanText(name, 40)}, ${unit}` : cleanText(name, 40);
}

export function dayOf(speech: Speech, section: SectionData, column: SectionDataColumn, zone: string): string {
  return moment(speech.tag, new Date(timeOf(section, column)).toISOString(), section.stepDays, zone);
}

/** What holds at the line, a sentence for the storage and one for each outflow. */
export function atLine(speech: Speech, section: SectionData, column: SectionDataColumn, zone: string): string {
  const known = millimetres(speech, knownDepth(column));
  const values = { date: dayOf(speech, section, column, zone), known, older: millimetres(speech, column.preRecordDepth) };
  const storage = speech.say(section.storageInformed ? 'column.inRecord' : 'column.inRecordOpen', values);
  return [storage, ...outflowsOf(section).map((name) => drawn(speech, column, name))].join(' ');
}

function drawn(speech: Speech, column: SectionDataColumn, name: string): string {
  const outflow = outflowName(speech, name);
  const flow = column.flow[name] ?? 0;
  if (!(flow > 0)) return speech.say('column.nothing', { outflow });
  const depth = depthOfShare(column, name, 0.5);
  const values = { outflow, flow: rate(speech, flow) };
  return depth === null
    ? speech.say('column.halfBeyond', values)
    : speech.say('column.half', { ...values, depth: millimetres(speech, depth) });
}

/** The column as a table: a row a layer, the pre-record water last. */
export function columnRows(speech: Speech, section: SectionData, column: SectionDataColumn): { columns: string[]; rows: string[][] } {
  const outflows = outflowsOf(section);
  const tracers = tracersOf(section);
  const { bottom, youngest, oldest } = column;
  const span = (from: number, to: number): string =>
    speech.say('amount.span', { low: millimetres(speech, from), high: millimetres(speech, to) });
  const share = (name: string, row: number): string =>
    percent(speech, column.selection[name]![row]! - (row ? column.selection[name]![row - 1]! : 0));
  const layer = (row: number): string[] => [
    span(row ? bottom[row - 1]! : 0, bottom[row]!),
    oldest[row]! < 2 ? age(speech, oldest[row]!) : ageSpan(speech, youngest[row]!, oldest[row]!),
    ...outflows.map((name) => share(name, row)),
    ...tracers.map((name) => number(speech.tag, { maximumSignificantDigits: 4 }).format(column.concentration[name]![row]!)),
  ];
  const below = section.storageInformed ? span(knownDepth(column), column.storage) : `> ${millimetres(speech, knownDepth(column))}`;
  const rest = (): string[] => outflows.map((name) => percent(speech, Math.max(0, 1 - (column.selection[name]!.at(-1) ?? 0))));
  return {
    columns: [
      speech.say('column.layer'),
      speech.say('column.ageOf'),
      ...outflows.map((name) => speech.say('column.shareOf', { outflow: outflowName(speech, name) })),
      ...tracers.map((name) => tracerName(section, name)),
    ],
    rows: lazyRows(bottom.length + 1, (row) =>
      row < bottom.length ? layer(row) : [below, speech.say('column.preRecord'), ...rest(), ...tracers.map(() => '–')],
    ),
  };
}
