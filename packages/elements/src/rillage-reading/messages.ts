import { amountMessages } from '../shared/format.js';

/** English of what stands around the sentence; the rest is with the parts that say it, compose and details. */
export const readingMessages = {
  ...amountMessages,
  'reading.invented': 'An invented station, for demonstration: no such place exists.',
  'reading.caution':
    'An estimate for information and planning, not for drinking-water, bathing or emergency decisions. Local rules, the responsible authority and licensed practice come first.',
  'reading.date': 'As of {date}',
  'reading.dateEnd': 'Data to the end of {date}',
  'reading.old': 'Old data',
  'reading.kept': 'Kept copy',
} as const;
export type ReadingKey = keyof typeof readingMessages;
