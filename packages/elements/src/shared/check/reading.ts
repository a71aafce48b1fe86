import type { Reading } from '@rillage/sdk';
import {
  amount,
  fields,
  firstUnfit,
  flag,
  instant,
  listOf,
  maybe,
  oneOf,
  orNull,
  positive,
  rangeOf,
  share,
  text,
  type Check,
} from './fields.js';

/** Every field that a reading is shown from. */
export const readingCheck: Check = fields({
  kind: oneOf('rillage-reading'),
  version: oneOf(1),
  of: text,
  at: instant,
  stepDays: positive,
  status: oneOf('given', 'withheld'),
  withheld: listOf(fields({ code: text })),
  confidence: oneOf('firm', 'tentative', 'withheld', 'notAssessed'),
  confidenceBecause: listOf(text),
  younger: listOf(fields({ days: positive, share: orNull(share), unplaced: share, range: rangeOf(share) })),
  median: orNull(fields({ days: amount, beyondRecord: flag, range: rangeOf(amount) })),
  olderThanRecord: fields({ share: orNull(share), range: rangeOf(share) }),
  assumedShare: share,
  trend: orNull(fields({ direction: oneOf('younger', 'older', 'usual'), usualShare: share, days: positive, years: positive })),
  language: text,
  sentence: text,
  sentences: maybe(listOf(text)),
  caution: text,
  evidence: fields({
    recordFrom: instant,
    recordTo: instant,
    samples: maybe(amount),
    lastSample: maybe(instant),
    sources: maybe(listOf(fields({ name: text, sha256: text }))),
  }),
});

/** The value where it is a reading that can be shown, else null. */
export const asReading = (value: unknown): Reading | null =>
  value && firstUnfit(readingCheck, value) === null ? (value as Reading) : null;
