/**
 * When a reading is withheld, and how sure it is called. Common practice and judgement, stated so that an agency can read and replace
 * them; no source prescribes these numbers.
 */
export interface ReadingRules {
  /** Withheld `recordTooShort` while the record is shorter than this, days. */
  leastRecordDays: number;
  /** Withheld `preRecordDominates` above this share of pre-record water, whatever the length of the record. */
  mostPreRecord: number;
  /** The same while the record is shorter than `longRecordDays`: "older than the record" then says next to nothing. */
  mostPreRecordShortRecord: number;
  longRecordDays: number;
  /** Withheld `storageRunsDown` when storage has fallen by more than this share of the initial storage, */
  mostStorageLoss: number;
  /** or by more than this, mm, which seasons and dry years can take, */
  usualSwing: number;
  /** and this share of all outflow since the record began, which only a record that does not balance takes. */
  mostDrift: number;
  /** Withheld `samplesTooOld` when the last sample is older than this, days. Only where samples are known of. */
  oldestSampleDays: number;
  /** `firm` needs ranges of the shares no wider than this, */
  firmWidth: number;
  /** a last sample no older than this, days, */
  firmSampleDays: number;
  /** a record of at least this, days, */
  firmRecordDays: number;
  /** at least so many samples, */
  firmSamples: number;
  /** spread over at least this, days, so that they saw every season, */
  firmSpanDays: number;
  /** and a share of water from before the record no greater than this. */
  firmPreRecord: number;
}

export const DEFAULT_READING_RULES: Readonly<ReadingRules> = {
  leastRecordDays: 7,
  mostPreRecord: 0.99,
  mostPreRecordShortRecord: 0.9,
  longRecordDays: 1096,
  mostStorageLoss: 0.8,
  usualSwing: 150,
  mostDrift: 0.1,
  oldestSampleDays: 200,
  firmWidth: 0.2,
  firmSampleDays: 62,
  firmRecordDays: 730,
  firmSamples: 24,
  firmSpanDays: 365,
  firmPreRecord: 0.5,
};

/** What the rules look at. */
export interface ReadingFacts {
  /** mm/day */
  flow: number;
  recordDays: number;
  preRecordShare: number;
  /** mm; NaN where not known. */
  initialStorage: number;
  storage: number;
  /** mm that left since the record began, all outflows; NaN where not known. */
  outflowSinceStart: number;
  /** Ranges can be given. */
  assessed: boolean;
  /** Widest 5–95 % range among the shares; NaN where not assessed. */
  widestRange: number;
  samples: number | null;
  /** Days from the last sample to the reading; null where no sample is known of. */
  daysSinceSample: number | null;
  /** Whether the fit converged; null where there was none or it was not said. */
  converged: boolean | null;
  /** Days from the first sample to the last; null where not known. */
  sampleSpanDays: number | null;
  /** Whether samples fall outside their predictive intervals more often than these claim; null where it was not looked at. */
  coverageTooNarrow: boolean | null;
  /** Whether the young water fraction from the seasonal cycle agrees with the fitted one; null where there is no cycle to look at. */
  crossCheckAgrees: boolean | null;
  /** Whether the ranges carry the doubt about the input: several ways of filling rain concentrations between bulk samples. */
  inputDoubtInRange: boolean;
}

export type WithheldCode =
  'noOutflow' | 'recordTooShort' | 'storageRunsDown' | 'preRecordDominates' | 'fitNotConverged' | 'samplesTooOld' | (string & {});

export interface Verdict {
  confidence: 'firm' | 'tentative' | 'withheld' | 'notAssessed';
  /** Codes of the rules that led there; the message catalogue has words for them. */
  because: string[];
  /** Withheld when not empty, worst first. */
  withheld: WithheldCode[];
}

/** A rule set as a function of the facts; replace it to publish by other rules. */
export type JudgeReading = (facts: ReadingFacts, rules: ReadingRules) => Verdict;

/** The default rules. */
export const judgeReading: JudgeReading = (facts, rules) => {
  const withheld: WithheldCode[] = [];
  if (!(facts.flow > 0)) withheld.push('noOutflow');
  if (facts.recordDays < rules.leastRecordDays) withheld.push('recordTooShort');
  if (runsDown(facts, rules)) withheld.push('storageRunsDown');
  const mostPreRecord = facts.recordDays < rules.longRecordDays ? rules.mostPreRecordShortRecord : rules.mostPreRecord;
  if (facts.preRecordShare > mostPreRecord) withheld.push('preRecordDominates');
  if (facts.converged === false) withheld.push('fitNotConverged');
  if (facts.daysSinceSample !== null && facts.daysSinceSample > rules.oldestSampleDays) withheld.push('samplesTooOld');
  if (withheld.length > 0) return { confidence: 'withheld', because: [...withheld], withheld };
  if (!facts.assessed) return { confidence: 'notAssessed', because: ['singleRun'], withheld };

  const doubts: string[] = [];
  if (!(facts.widestRange <= rules.firmWidth)) doubts.push('wideRange');
  if (facts.daysSinceSample === null) doubts.push('noSamples');
  else if (facts.daysSinceSample > rules.firmSampleDays) doubts.push('oldSample');
  if (facts.recordDays < rules.firmRecordDays) doubts.push('shortRecord');
  const few = facts.samples !== null && facts.samples < rules.firmSamples;
  if (few || (facts.sampleSpanDays !== null && facts.sampleSpanDays < rules.firmSpanDays)) doubts.push('fewSamples');
  if (facts.coverageTooNarrow === true) doubts.push('missedSamples');
  if (facts.crossCheckAgrees === false) doubts.push('secondOpinion');
  if (facts.preRecordShare > rules.firmPreRecord) doubts.push('muchOlder');
  if (!facts.inputDoubtInRange) doubts.push('inputDoubt');
  return doubts.length > 0
    ? { confidence: 'tentative', because: doubts, withheld }
    : { confidence: 'firm', because: ['narrowRange'], withheld };
};

function runsDown(facts: ReadingFacts, rules: ReadingRules): boolean {
  const loss = facts.initialStorage - facts.storage;
  if (loss > rules.mostStorageLoss * facts.initialStorage) return true;
  return loss > rules.usualSwing + rules.mostDrift * facts.outflowSinceStart;
}
