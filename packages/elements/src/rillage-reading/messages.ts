import { amountMessages } from '../shared/format.js';

/** English of what stands around the sentence; the sentence's own is in compose-messages.ts. */
export const readingMessages = {
  ...amountMessages,
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
