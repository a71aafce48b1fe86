import type { Sample, StationHistory } from '@rillage/sdk';
import { fields, firstUnfit, instant, isNumber, maybe, oneOf, positive, text, that, Unfit, type Check } from '../shared/check/fields.js';

/** The value where it is a history that can be drawn, else null. */
export function asHistory(value: unknown): StationHistory | null {
  if (!value) return null;
  if (known.has(value)) return value as StationHistory;
  if (firstUnfit(historyCheck, value) !== null) return null;
  known.add(value);
  return value as StationHistory;
}

/** Those samples that can be drawn, at most two thousand. */
export function asSamples(value: unknown): Sample[] {
  if (!Array.isArray(value)) return [];
  return (value as unknown[]).slice(0, 2000).filter((sample): sample is Sample => firstUnfit(sampleCheck, sample) === null);
}

const known = new WeakSet<object>();
const mostSteps = 20_000;

const sampleCheck = fields({
  tracer: text,
  from: instant,
  to: instant,
  value: that(isNumber),
  error: maybe(that((value) => isNumber(value) && value >= 0)),
  censored: maybe(oneOf('below', 'above')),
});

const series: Check = that(
  (value) => Array.isArray(value) && value.length <= mostSteps && value.every((entry) => entry === null || isNumber(entry)),
);
const byName: Check = (value, at) => {
  that((it) => typeof it === 'object' && it !== null && Object.keys(it).length <= 20)(value, at);
  for (const [name, entry] of Object.entries(value as object)) series(entry, `${at}.${name}`);
};
const shape = fields({
  start: instant,
  stepDays: positive,
  flow: series,
  younger: byName,
  youngerLow: maybe(byName),
  youngerHigh: maybe(byName),
  medianDays: series,
  medianLow: maybe(series),
  medianHigh: maybe(series),
  medianBeyondRecord: series,
  preRecordShare: series,
  concentration: byName,
});
const historyCheck: Check = (value, at) => {
  shape(value, at);
  const { flow, younger, medianDays, medianLow, medianHigh, medianBeyondRecord, preRecordShare, concentration } = value as StationHistory;
  const all = [
    medianDays,
    medianLow,
    medianHigh,
    medianBeyondRecord,
    preRecordShare,
    ...Object.values(younger),
    ...Object.values(concentration),
  ];
  if (flow.length < 2 || all.some((other) => other && other.length !== flow.length)) throw new Unfit(`${at}.flow`);
  if (Object.keys(younger).some((days) => !(Number(days) > 0))) throw new Unfit(`${at}.younger`);
};
