import { amountMessages } from '../shared/format.js';

/** English of the reading. A sentence is made from numbers in every language, so none needs the file's own prose. */
export const readingMessages = {
  ...amountMessages,
  'reading.stream': 'the stream',
  'reading.outflow': 'the water leaving as {of}',
  'reading.lead': {
    one: 'About {count} litre in {of} of {water} on {date} fell as rain within the last {period} ({range}).',
    other: 'About {count} litres in {of} of {water} on {date} fell as rain within the last {period} ({range}).',
  },
  'reading.leadBetween':
    'Between {low} and {high} litres in {of} of {water} on {date} fell as rain within the last {period}; the record is too short to say more.',
  'reading.leadFewer': 'Fewer than 1 litre in {of} of {water} on {date} fell as rain within the last {period} ({range}).',
  'reading.leadMore': 'More than {count} litres in {of} of {water} on {date} fell as rain within the last {period} ({range}).',
  'reading.likely': 'likely between {low} and {high} in {of}',
  'reading.half': 'Half of the water is older than {age}.',
  'reading.halfAbout': 'Half of the water is older than about {age} (range not assessed).',
  'reading.halfBeyond': 'More than half of the water is older than the record, which began in {month}; its age is not known.',
  'reading.beyond': {
    one: 'About {count} litre in {of} was already in the ground when records began in {month} ({range}); its age is not known.',
    other: 'About {count} litres in {of} were already in the ground when records began in {month} ({range}); their age is not known.',
  },
  'reading.beyondFewer':
    'Fewer than 1 litre in {of} was already in the ground when records began in {month} ({range}); its age is not known.',
  'reading.beyondMore':
    'More than {count} litres in {of} were already in the ground when records began in {month} ({range}); their age is not known.',
  'reading.assumed':
    'About {count} litres in {of} are given an age only by assuming that the weather before the record was like the weather in it.',
  'reading.withheld': 'No age is given for {date}.',
  'reading.noOutflow': 'No water left on that day.',
  'reading.recordTooShort': 'The record is too short to say anything.',
  'reading.storageRunsDown': 'The water balance of the record does not hold: more leaves than can have been there.',
  'reading.preRecordDominates': 'Nearly all of the water was there before the record began.',
  'reading.fitNotConverged': 'The samples did not settle on an answer.',
  'reading.notAssessed': 'Too little is known to state it.',
  'reading.invented': 'An invented station, for demonstration: no such place exists.',
  'reading.caution':
    'An estimate for information and planning, not for drinking-water, bathing or emergency decisions. Local rules, the responsible authority and licensed practice come first.',
  'reading.table': 'The numbers behind the sentence',
  'reading.within': 'Fell as rain within {age}',
  'reading.medianRow': 'Half is older than',
  'reading.olderRow': 'Older than the record, age not known',
  'reading.what': 'Of the water',
  'reading.share': 'Share',
  'reading.range': 'Likely range',
  'reading.atLeast': 'at least {share}',
  'reading.date': 'As of {date}',
  'reading.dateEnd': 'Data to the end of {date}',
  'reading.old': 'Old data',
  'reading.kept': 'Kept copy',
  'reading.trendYounger':
    'Younger than usual for the season: {share} fell as rain within the last {age}, against {usual} in the same weeks of {years} earlier years.',
  'reading.trendOlder':
    'Older than usual for the season: {share} fell as rain within the last {age}, against {usual} in the same weeks of {years} earlier years.',
  'reading.trendUsual':
    'Usual for the season: {share} fell as rain within the last {age}, against {usual} in the same weeks of {years} earlier years.',
  'reading.confidence': 'How sure',
  'reading.firm': 'Firm: the samples agree and inform the answer.',
  'reading.tentative': 'Tentative: take the range, not the middle.',
  'reading.confidenceWithheld': 'Not sure enough to give a number.',
  'reading.confidenceNotAssessed': 'Not assessed: one run of the model, not checked against samples, so no range can be given.',
  'reading.evidence': 'What it rests on',
  'reading.record': 'Record',
  'reading.recordSpan': '{from} to {to}',
  'reading.samples': 'Samples',
  'reading.samplesLast': {
    one: '{count} water sample, of {date}',
    other: '{count} water samples, the last of {date}',
  },
  'reading.samplesNone': 'none used',
  'reading.method': 'Method',
  'reading.sources': 'Sources',
} as const;
export type ReadingKey = keyof typeof readingMessages;
