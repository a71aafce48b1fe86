import type { Sample, StationHistory } from '@rillage/sdk';
import { age, ageSpan, date, moment, msPerDay, number, olderThan, percent } from '../shared/format.js';
import { lazyRows } from '../shared/lazy-rows.js';
import { cleanText } from '../shared/text.js';
import { endOf, type Spaced, type Span } from './frame.js';
import type { Speech } from './panels.js';
import { bandsOf, limitsOf, sharesAt, type AgeBand } from './stack.js';

export function bandName(speech: Speech, { from, to }: AgeBand): string {
  if (from === null) return speech.say('history.preRecord');
  if (to === null) return speech.say('history.older', { age: age(speech, from) });
  if (from === 0) return speech.say('history.upTo', { age: age(speech, to) });
  return speech.say('history.between', { from: age(speech, from), to: age(speech, to) });
}

export const dayOf = (speech: Speech, history: Spaced, step: number, zone: string): string =>
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
  const day = dayOf(speech, history, step, zone);
  const shares = sharesAt(history, step);
  if (!shares) return speech.say('history.dry', { date: day });
  const bands = bandsOf(history);
  if (series === 0) {
    const parts = bands.map((band, index) => `${bandName(speech, band)}: ${percent(speech, shares[index]!)}`);
    const list = parts.join('; ');
    return `${speech.say('history.readAll', { date: day, flow: flowText(speech, history.flow[step]), shares: list })}. ${median(speech, history, step, day)}`;
  }
  const band = bands[series - 1];
  return band
    ? speech.say('history.readClass', { date: day, share: percent(speech, shares[series - 1]!), name: bandName(speech, band) })
    : median(speech, history, step, day);
}

function median(speech: Speech, history: StationHistory, step: number, day: string): string {
  const days = history.medianDays[step];
  if (days === null || days === undefined) return '';
  if (history.medianBeyondRecord[step] === 1) return speech.say('history.readMedianBeyond', { date: day });
  return speech.say('history.readMedian', { date: day, age: age(speech, days), range: medianSpan(speech, history, step) });
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

/** The window as a table: one row for each stop of the cursor; of the tracers, the one that is drawn. */
export function historyRows(
  speech: Speech,
  history: StationHistory,
  stops: number[],
  below: string,
  zone: string,
): { columns: string[]; rows: string[][] } {
  const bands = bandsOf(history);
  const tracer = Object.hasOwn(history.concentration, below) ? history.concentration[below]! : null;
  const significant = number(speech.tag, { maximumSignificantDigits: 4 });
  const ranged = Boolean(history.medianLow && history.medianHigh);
  const columns = [
    speech.say('history.date'),
    speech.say('history.flow'),
    ...bands.map((band) => bandName(speech, band)),
    speech.say(ranged ? 'history.median' : 'history.medianBare'),
    ...(ranged ? [speech.say('history.medianRange')] : []),
    ...(tracer ? [speech.say('history.simulated', { tracer: cleanText(below, 40) })] : []),
  ];
  const rows = lazyRows(stops.length, (index) => {
    const step = stops[index]!;
    const shares = sharesAt(history, step);
    const days = history.medianDays[step];
    const value = tracer?.[step];
    return [
      shortDay(speech, history, step, zone),
      flowText(speech, history.flow[step]),
      ...bands.map((_, band) => (shares ? percent(speech, shares[band]!) : '–')),
      days == null ? '–' : history.medianBeyondRecord[step] === 1 ? olderThan(speech, days) : age(speech, days),
      ...(ranged ? [medianSpan(speech, history, step)] : []),
      ...(tracer ? [value == null ? '–' : significant.format(value)] : []),
    ];
  });
  return { columns, rows };
}

/** As {@link dayOf}, in fewer letters. */
function shortDay(speech: Speech, history: StationHistory, step: number, zone: string): string {
  if (history.stepDays < 1) return dayOf(speech, history, step, zone);
  return date(speech.tag, endOf(history, step) - msPerDay / 2, { dateStyle: 'medium' }, zone);
}
