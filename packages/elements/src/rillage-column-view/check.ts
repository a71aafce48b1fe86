import {
  amount,
  fields,
  firstUnfit,
  flag,
  instant,
  isNumber,
  oneOf,
  positive,
  share,
  text,
  that,
  Unfit,
  type Check,
} from '../shared/check/fields.js';
import type { SectionData, SectionDataColumn } from './section-type.js';

/** The value where it is a section that can be drawn, else null. */
export function asSection(value: unknown): SectionData | null {
  if (known.has(value as object)) return value as SectionData;
  if (!value || firstUnfit(sectionCheck, value) !== null) return null;
  known.add(value as object);
  return value as SectionData;
}

// A section is checked once, not on every move of the line.
const known = new WeakSet<object>();
const mostColumns = 1200;
const mostRows = 400;
const mostFlows = 4000;
const mostNames = 20;

const list =
  (most: number, each: (value: unknown, index: number, all: unknown[]) => boolean): Check =>
  (value, at) => {
    if (!Array.isArray(value) || value.length > most || !value.every(each)) throw new Unfit(at);
  };
const byName =
  (check: Check): Check =>
  (value, at) => {
    that((it) => typeof it === 'object' && it !== null && Object.keys(it).length <= mostNames)(value, at);
    for (const [name, entry] of Object.entries(value as object)) check(entry, `${at}.${name}`);
  };
const rising = (value: unknown, index: number, all: unknown[]): boolean =>
  isNumber(value) && value >= (index ? (all[index - 1] as number) - 1e-3 : 0);
const holds = (check: Check, value: unknown): boolean => firstUnfit(check, value) === null;

const columnFields = fields({
  step: amount,
  storage: amount,
  preRecordDepth: amount,
  bottom: list(mostRows, rising),
  youngest: list(mostRows, rising),
  oldest: list(mostRows, rising),
  concentration: byName(list(mostRows, isNumber)),
  selection: byName(list(mostRows, (value) => holds(share, value))),
  flow: byName(amount),
});

const columnCheck: Check = (value, at) => {
  columnFields(value, at);
  const { bottom, youngest, oldest, concentration, selection } = value as SectionDataColumn;
  const lists = [youngest, oldest, ...Object.values(concentration), ...Object.values(selection)];
  if (lists.some((other) => other.length !== bottom.length)) throw new Unfit(`${at}.bottom`);
};

const sectionCheck = fields({
  kind: oneOf('rillage-section'),
  version: oneOf(1),
  start: instant,
  stepDays: positive,
  steps: positive,
  columns: (value, at) => {
    list(mostColumns, (column) => holds(columnCheck, column))(value, at);
    const columns = value as SectionDataColumn[];
    if (columns.length === 0 || columns.some(({ step }, index) => index > 0 && step <= columns[index - 1]!.step)) throw new Unfit(at);
  },
  flow: fields({ stepDays: positive, outflows: byName(list(mostFlows, (value) => holds(amount, value))) }),
  storageInformed: flag,
  units: byName(text),
});
