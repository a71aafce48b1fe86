import type { amountMessages } from '../shared/format.js';

/** English of sentences made from the numbers, for a file whose own prose is in another language. */
export const composeMessages = {
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
  'reading.samplesTooOld': 'The last bottle analysed is too old for the record to carry a statement.',
  'reading.fitNotConverged': 'The samples did not settle on an answer.',
  'reading.notAssessed': 'Too little is known to state it.',
} as const;
export type ComposeKey = keyof typeof composeMessages | keyof typeof amountMessages;
