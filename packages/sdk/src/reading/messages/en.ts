/**
 * English. `{water}` is `waterDischarge` or `waterOther`; `{date}`, `{month}`, `{age}`, `{period}` come formatted; `{count}`, `{low}`, `{high}` of
 * `{base}` are litres. Plurals are chosen by `{count}`.
 */
export const english = {
  waterDischarge: 'the stream',
  waterOther: 'the outflow “{name}”',

  shareAbout: {
    one: 'About {count} litre in {base} of {water} on {date} fell as rain within the last {period}{sure}.',
    other: 'About {count} litres in {base} of {water} on {date} fell as rain within the last {period}{sure}.',
  },
  shareFew: 'Fewer than 1 litre in 100 of {water} on {date} fell as rain within the last {period}{sure}.',
  shareNearlyAll: 'More than 99 litres in 100 of {water} on {date} fell as rain within the last {period}{sure}.',
  shareBetween:
    'Between {low} and {high} litres in {base} of {water} on {date} fell as rain within the last {period}{sure}; the record is too short to say more.',

  medianAbout: 'Half of the water is older than about {age}{sure}.',
  medianRange: 'Half of the water is older than {low} to {high}.',
  medianRangeOpen: 'Half of the water is older than {low}, and perhaps older than the record itself, which goes back {age}.',
  medianBeyond: 'Half of the water or more is older than the record, which goes back {age}; by how much is not known.',

  olderAbout: {
    one: 'About {count} litre in {base} was already in the ground when records began in {month}{sure}; its age is not known.',
    other: 'About {count} litres in {base} were already in the ground when records began in {month}{sure}; their age is not known.',
  },
  olderFew: 'Fewer than 1 litre in 100 was already in the ground when records began in {month}{sure}; its age is not known.',
  olderNearlyAll: 'More than 99 litres in 100 were already in the ground when records began in {month}{sure}; their age is not known.',
  assumedAbout: {
    one: 'About {count} litre in {base} rests on assumed weather from before the record.',
    other: 'About {count} litres in {base} rest on assumed weather from before the record.',
  },

  assumedFew: 'Fewer than 1 litre in 100 rests on assumed weather from before the record.',
  assumedNearlyAll: 'More than 99 litres in 100 rest on assumed weather from before the record.',

  sureRange: ' (likely between {low} and {high} in {base})',
  sureNotAssessed: ' (range not assessed)',

  withheld: 'No age is given for {date}: {reason}.',
  withheldNoOutflow: 'there was no outflow',
  withheldRecordTooShort: { one: 'the record is only {count} day long', other: 'the record is only {count} days long' },
  withheldStorageRunsDown: 'the balance of rain and outflow drains the storage, so one of the records must be wrong',
  withheldPreRecordDominates:
    'nearly all of the water was already in the ground when records began in {month}, and the record is too short to say how old it is',
  withheldFitNotConverged: 'the fit to the laboratory samples has not settled',
  withheldSamplesTooOld: 'the last bottle analysed is from {month}, and the record cannot carry a statement this far',
  withheldOther: 'a rule of the publisher withholds it ({code})',

  becauseSingleRun: 'From a single model run; the range is not assessed.',
  becauseNarrowRange: 'The ranges are narrow, the last sample is recent and the record is long enough.',
  becauseWideRange: 'The ranges are wide.',
  becauseNoSamples: 'No laboratory sample supports the model.',
  becauseInputDoubt: 'The range does not hold the doubt about rain between its samples, so the truth may lie outside it.',
  becauseOldSample: 'The last laboratory sample is some time back, from {month}.',
  becauseShortRecord: 'The record is short.',
  becauseFewSamples: 'The laboratory samples are few, or do not cover a year.',
  becauseMissedSamples: 'More samples fall outside what the model expects than should.',
  becauseSecondOpinion: 'The seasons in the samples, taken by themselves, point to another share of young water.',
  becauseMuchOlder: 'Much of the water is older than the record.',
  becauseOther: 'By a rule of the publisher ({code}).',

  caution:
    'An estimate for information and planning, not a basis for drinking-water, bathing or emergency decisions. The responsible authority, local rules and licensed practice come first.',
  method: 'Age-ranked storage with a selection function for each outflow ({selections}); {runs}.',
  methodSingle: 'one run',
  methodEnsemble: { one: '{count} run', other: '{count} runs, weighted' },
};
