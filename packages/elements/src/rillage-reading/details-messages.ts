import { amountMessages } from '../shared/format.js';

/** English of what the full form says beneath the sentence. */
export const detailsMessages = {
  ...amountMessages,
  'reading.table': 'The numbers behind the sentence',
  'reading.within': 'Fell as rain within {age}',
  'reading.medianRow': 'Half is older than',
  'reading.olderRow': 'Older than the record, age not known',
  'reading.what': 'Of the water',
  'reading.share': 'Share',
  'reading.range': 'Likely range',
  'reading.atLeast': 'at least {share}',
  'reading.trend': '{how}: {share} fell as rain within the last {age}, against {usual} in the same weeks of {years} earlier years.',
  'reading.younger': 'Younger than usual for the season',
  'reading.older': 'Older than usual for the season',
  'reading.usual': 'Usual for the season',
  'reading.confidence': 'How sure',
  'reading.firm': 'Firm: the samples agree and inform the answer.',
  'reading.tentative': 'Tentative: take the range, not the middle.',
  'reading.confidenceWithheld': 'Not sure enough to give a number.',
  'reading.confidenceNotAssessed': 'Not assessed: one run of the model, not checked against samples, so no range can be given.',
  'reading.evidence': 'What it rests on',
  'reading.record': 'Record',
  'reading.samples': 'Samples',
  'reading.samplesLast': {
    one: '{count} water sample, of {date}',
    other: '{count} water samples, the last of {date}',
  },
  'reading.samplesNone': 'none used',
  'reading.method': 'Method',
  'reading.sources': 'Sources',
} as const;
export type DetailsKey = keyof typeof detailsMessages;
