import type { DistributionWithRange } from '@rillage/sdk';
import { age, ageSpan, percent } from '../shared/format.js';
import { ageAt } from './curve.js';
import { curvesOf, type Speech } from './view.js';

/** What the picture shows, in two sentences: where half of the water lies, and what lies beyond the record. */
export function summary(speech: Speech, distribution: DistributionWithRange): string {
  const { recordDays, preRecordShare } = distribution;
  const record = age(speech, recordDays);
  const beyond =
    preRecordShare > 0
      ? speech.say('plot.summaryBeyond', { share: percent(speech, preRecordShare), record })
      : speech.say('plot.summaryAll', { record });
  return `${half(speech, distribution)} ${beyond}`;
}

function half(speech: Speech, distribution: DistributionWithRange): string {
  const { middle, low, high } = curvesOf(distribution);
  const { recordDays } = distribution;
  const median = ageAt(middle, 0.5);
  if (median > recordDays) return speech.say('plot.summaryHalfBeyond');
  if (!low || !high) return speech.say('plot.summaryHalfAbout', { age: age(speech, median) });
  const older = ageAt(low, 0.5);
  const beyond = older > recordDays;
  return speech.say('plot.summaryHalf', {
    age: ageSpan(speech, Math.min(ageAt(high, 0.5), recordDays), beyond ? recordDays : older, beyond),
  });
}
