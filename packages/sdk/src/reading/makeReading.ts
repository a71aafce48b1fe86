import { type Reading, type ReadingSource, type StationHistory } from '../contract.js';
import { type Members, readMembers } from './members.js';
import { type MessageKey, type Messages, messagesFor, say } from './messages/catalogue.js';
import { numbersAt, type StepNumbers } from './numbers.js';
import { DEFAULT_READING_RULES, type JudgeReading, judgeReading, type ReadingFacts, type ReadingRules } from './readingRules.js';
import { daysBetween, stepEnd, stepOf } from './readingTime.js';
import { givenSentences, type Speaker, withheldSentence } from './sentence.js';
import { trendAt } from './trend.js';
import { SDK_VERSION } from './version.js';
import { monthText } from './wording.js';

/** What a run needs to be asked for so that a reading and a station can be made from it. */
export const READING_RUN_OPTIONS: { youngerThan: number[]; quantiles: number[] } = { youngerThan: [7, 30, 90, 365], quantiles: [0.5] };

export interface ReadingOptions {
  /** ISO instant at a step's end or within it, or a date; default: the last step. */
  at?: string;
  /** Outflow; default `discharge`, or the only one. */
  of?: string;
  /** Language tag; default `en`. */
  language?: string;
  /** Messages of the caller's own, laid over the language's. */
  messages?: Partial<Messages>;
  station?: { id: string; name: string; invented?: boolean };
  /** Laboratory samples behind the model; `last` is an ISO instant. */
  samples?: { count: number; last: string | null };
  sources?: { name: string; sha256: string }[];
  /** Whether the fit behind the weights converged. */
  converged?: boolean;
  /** Whether the weights carry several ways of filling rain concentrations, so that a narrow range may be called firm. Default false. */
  inputDoubtInRange?: boolean;
  /** Days from the first sample to the last. */
  sampleSpanDays?: number;
  /** Whether samples miss their predictive intervals more often than these claim. */
  coverageTooNarrow?: boolean;
  /** Whether the seasonal cycle's young water fraction agrees with the fitted one. */
  crossCheckAgrees?: boolean;
  /** mm that left since the record began; needed to judge the balance of a resumed run. */
  balance?: { outflow: number };
  /** Gives the trend. */
  history?: StationHistory;
  rules?: Partial<ReadingRules>;
  judge?: JudgeReading;
}

/**
 * The public statement for one moment: shares by age, median, share older than the record, in numbers and in plain sentences, withheld with
 * the reason where the data cannot carry it. From a single run no range is given and the reading says so; from weighted runs the ranges
 * are 5–95 %.
 * @throws RillageError 'no-run', 'weights', 'runs-differ', 'unknown-outflow', 'at-outside', 'time', 'unknown-language'
 */
export function makeReading(source: ReadingSource, options: ReadingOptions = {}): Reading {
  const members = readMembers(source, options.of);
  return readingOf(members, options);
}

export function readingOf(members: Members, options: ReadingOptions): Reading {
  const language = options.language ?? 'en';
  const speaker: Speaker = { language, messages: messagesFor(language, options.messages) };
  const step = stepOf(options.at, members);
  const at = stepEnd(members.start, members.stepDays, step);
  const numbers = numbersAt(members, step);
  const facts = factsOf(members, step, at, numbers, options);
  const verdict = (options.judge ?? judgeReading)(facts, { ...DEFAULT_READING_RULES, ...options.rules });
  const given = verdict.withheld.length === 0;
  const months = { month: monthText(members.recordStart, language), count: Math.floor(facts.recordDays) };
  const sampleMonth = options.samples?.last ? monthText(options.samples.last, language) : '';
  const word = (kind: 'withheld' | 'because', code: string): string =>
    reasonText(speaker, kind, code, { ...months, ...(code === 'samplesTooOld' || code === 'oldSample' ? { month: sampleMonth } : {}) });

  const reading: Reading = {
    kind: 'rillage-reading',
    version: 1,
    ...(options.station ? { station: { ...options.station } } : {}),
    of: members.of,
    at,
    stepDays: members.stepDays,
    status: given ? 'given' : 'withheld',
    withheld: verdict.withheld.map((code) => ({ code, because: word('withheld', code) })),
    confidence: given ? verdict.confidence : 'withheld',
    confidenceBecause: given
      ? verdict.because.map((code) => word('because', code))
      : verdict.withheld.map((code) => word('withheld', code)),
    younger: given ? numbers.younger : numbers.younger.map(({ days }) => ({ days, share: null, unplaced: 1, range: null })),
    median: given ? numbers.median : null,
    olderThanRecord: given ? numbers.older : { share: null, range: null },
    assumedShare: given ? numbers.assumedShare : 0,
    trend: given && options.history ? trendAt(options.history, at, numbers.younger.find(({ days }) => days === 30)?.share ?? null) : null,
    language,
    sentence: '',
    caution: say(speaker.messages, language, 'caution'),
    evidence: {
      recordFrom: members.recordStart,
      recordTo: at,
      samples: options.samples?.count ?? null,
      lastSample: options.samples?.last ?? null,
      method: methodText(speaker, members),
      version: SDK_VERSION,
      sources: (options.sources ?? []).map(({ name, sha256 }) => ({ name, sha256 })),
    },
  };
  const sentences = given
    ? givenSentences(speaker, reading, members.recordStart, numbers.recordDays)
    : [withheldSentence(speaker, at, members.stepDays, (reading.withheld[0] as { because: string }).because)];
  return { ...reading, sentences, sentence: sentences.join(' ') };
}

function factsOf(members: Members, step: number, at: string, numbers: StepNumbers, options: ReadingOptions): ReadingFacts {
  const run = members.runs[0] as Members['runs'][number];
  const widths = numbers.younger.map(({ range }) => (range ? range.high - range.low : NaN));
  const last = options.samples?.last ?? null;
  return {
    flow: numbers.flow,
    recordDays: numbers.recordDays,
    preRecordShare: numbers.older.share,
    initialStorage: members.catchment.initialStorage,
    storage: run.storage[step] as number,
    outflowSinceStart: options.balance?.outflow ?? outflowInRun(members, step),
    assessed: members.assessed,
    widestRange: members.assessed ? Math.max(...widths, numbers.older.range ? numbers.older.range.high - numbers.older.range.low : 0) : NaN,
    samples: options.samples?.count ?? null,
    daysSinceSample: last === null ? null : daysBetween(last, at),
    converged: options.converged ?? null,
    sampleSpanDays: options.sampleSpanDays ?? null,
    coverageTooNarrow: options.coverageTooNarrow ?? null,
    crossCheckAgrees: options.crossCheckAgrees ?? null,
    inputDoubtInRange: options.inputDoubtInRange ?? false,
  };
}

/** NaN for a run that does not reach back to the record's start. */
function outflowInRun({ runs, steps, stepDays, recordSteps }: Members, step: number): number {
  if (recordSteps !== steps) return NaN;
  let sum = 0;
  for (const { flow } of Object.values((runs[0] as Members['runs'][number]).outflows)) {
    for (let i = 0; i <= step; i += 1) sum += flow[i] as number;
  }
  return sum * stepDays;
}

/** The catalogue's words for a rule's code: `noOutflow` is `withheldNoOutflow`. */
function reasonText(
  { messages, language }: Speaker,
  kind: 'withheld' | 'because',
  code: string,
  values: Record<string, string | number>,
): string {
  const key = `${kind}${code.charAt(0).toUpperCase()}${code.slice(1)}`;
  if (Object.hasOwn(messages, key)) return say(messages, language, key as MessageKey, values);
  return say(messages, language, `${kind}Other`, { ...values, code });
}

function methodText({ messages, language }: Speaker, { runs, assessed, catchment: { selection } }: Members): string {
  const selections = Object.keys(selection)
    .sort()
    .map((outflow) => `${outflow}: ${selection[outflow]?.form ?? ''}`)
    .join(', ');
  const count = assessed ? say(messages, language, 'methodEnsemble', { count: runs.length }) : say(messages, language, 'methodSingle');
  return say(messages, language, 'method', { selections, runs: count });
}
