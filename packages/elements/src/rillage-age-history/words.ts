import type { Sample, StationHistory } from '@rillage/sdk';
import { age, ageSpan, moment, number, olderThan, percent } from '../shared/format.js';
import { lazyRows } from '../shared/lazy-rows.js';
import { cleanText } from '../shared/text.js';
import { endOf, type Span } from './frame.js';
import type { Speech } from './panels.js';
import { bandsOf, limitsOf, sharesAt, type AgeBand } from './stack.js';

export function bandName(speech: Speech, { from, to }: AgeBand): string {
  if (from === null) return speech.say('history.preRecord');
  if (to === null) return speech.say('history.older', { age: age(speech, from) });
  if (from === 0) return speech.say('history.upTo', { age: age(speech, to) });
  return speech.say('history.between', { from: age(speech, from), to: age(speech, to) });
}

export const dayOf = (speech: Speech, history: StationHistory, step: number, zone: string): string =>
  moment(speech.tag, new Date(endOf(history, step)).toISOString(), history.stepDays, zone);

const flowText = (speech: Speech, flow: number | null | undefined): string =>
  number(speech.tag, { maximumSignificantDigits: 2 }).format(flow ?? 0);

/** What the lower panel shows and does not show. */
export function aboutBelow(speech: Speech, history: StationHistory, below: string, samples: Sample[]): string {
  if (below === 'shares') return speech.say('history.aboutShares');
  if (below === 'median') return speech.say(history.medianLow ? 'history.aboutMedian' : 'history.aboutMedianBare');
  return speech.say(samples.some(({ tracer }) => tracer === below) ? 'history.aboutTracer' : 'history.noSamples');
}

/** What is read at a step: everything (series 0), one class (1 to K), or the median (K + 1). */
export function readAt(speech: Speech, history: StationHistory, series: number, step: number, zone: string): string {
  const date = dayOf(speech, history, step, zone);
  const shares = sharesAt(history, step);
  if (!shares) return speech.say('history.dry', { date });
  const bands = bandsOf(history);
  if (series === 0) {
    const parts = bands.map((band, index) => `${bandName(speech, band)}: ${percent(speech, shares[index]!)}`);
    const list = parts.join('; ');
    return `${speech.say('history.readAll', { date, flow: flowText(speech, history.flow[step]), shares: list })}. ${median(speech, history, step, date)}`;
  }
  const band = bands[series - 1];
  return band
    ? speech.say('history.readClass', { date, share: percent(speech, shares[series - 1]!), name: bandName(speech, band) })
    : median(speech, history, step, date);
}

function median(speech: Speech, history: StationHistory, step: number, date: string): string {
  const days = history.medianDays[step];
  if (days === null || days === undefined) return '';
  if (history.medianBeyondRecord[step] === 1) return speech.say('history.readMedianBeyond', { date });
  return speech.say('history.readMedian', { date, age: age(speech, days), range: medianSpan(speech, history, step) });
}

function medianSpan(speech: Speech, { medianLow, medianHigh }: StationHistory, step: number): string {
  const [low, high] = [medianLow?.[step], medianHigh?.[step]];
  return low == null || high == null ? speech.say('amount.unassessed') : ageSpan(speech, low, high);
}

/** The window in two sentences, its shares weighted by flow. */
export function summary(speech: Speech, history: StationHistory, { from, to }: Span, zone: string): string {
  const limits = limitsOf(history);
  const limit = limits.find((days) => days >= 30) ?? limits[0] ?? 0;
  let [all, young, beyond] = [0, 0, 0];
  for (let step = from; step < to; step++) {
    const shares = sharesAt(history, step);
    if (!shares) continue;
    const flow = history.flow[step]!;
    all += flow;
    young += flow * (history.younger[limit]?.[step] ?? 0);
    beyond += flow * shares[shares.length - 1]!;
  }
  return speech.say('history.summary', {
    from: dayOf(speech, history, from, zone),
    to: dayOf(speech, history, to - 1, zone),
    young: percent(speech, all ? young / all : null),
    limit: age(speech, limit),
    beyond: percent(speech, all ? beyond / all : null),
  });
}

/** The window as a table: one row for each stop of the cursor. */
export function historyRows(
  speech: Speech,
  history: StationHistory,
  stops: number[],
  zone: string,
): { columns: string[]; rows: string[][] } {
  const bands = bandsOf(history);
  const tracers = Object.keys(history.concentration);
  const significant = number(speech.tag, { maximumSignificantDigits: 4 });
  const columns = [
    speech.say('history.date'),
    speech.say('history.flow'),
    ...bands.map((band) => bandName(speech, band)),
    speech.say('history.median'),
    speech.say('history.medianRange'),
    ...tracers.map((name) => speech.say('history.simulated', { tracer: cleanText(name, 40) })),
  ];
  const rows = lazyRows(stops.length, (index) => {
    const step = stops[index]!;
    const shares = sharesAt(history, step);
    const days = history.medianDays[step];
    return [
      dayOf(speech, history, step, zone),
      flowText(speech, history.flow[step]),
      ...bands.map((_, index) => (shares ? percent(speech, shares[index]!) : '–')),
      days == null ? '–' : history.medianBeyondRecord[step] === 1 ? olderThan(speech, days) : age(speech, days),
      medianSpan(speech, history, step),
      ...tracers.map((name) => {
        const value = history.concentration[name]![step];
        return value == null ? '–' : significant.format(value);
      }),
    ];
  });
  return { columns, rows };
}
