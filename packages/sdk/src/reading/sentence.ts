import { type MedianAge, type Range, type Reading, type ShareYounger } from '../contract.js';
import { type MessageKey, type Messages, say } from './messages/catalogue.js';
import { ageRangeTexts, ageText, dateText, daysText, litres, litresRange, monthText } from './wording.js';

/** The age the first sentence speaks of when the record allows: about a month. */
const SPOKEN_AGE = 30;
/** Shares below this are not worth a sentence. */
const WORTH_SAYING = 0.005;

export interface Speaker {
  messages: Messages;
  language: string;
}

type Told = Pick<Reading, 'of' | 'at' | 'stepDays' | 'younger' | 'median' | 'olderThanRecord' | 'assumedShare'>;

/** The plain sentences of a reading that is given. */
export function givenSentences(speaker: Speaker, reading: Told, recordStart: string, recordDays: number): string[] {
  const spoken = spokenShare(reading.younger);
  return [
    spoken ? shareSentence(speaker, reading, spoken) : null,
    reading.median ? medianSentence(speaker, reading.median, recordDays) : null,
    olderSentence(speaker, reading.olderThanRecord, recordStart),
    reading.assumedShare > WORTH_SAYING ? assumedSentence(speaker, reading.assumedShare) : null,
  ].filter((sentence) => sentence !== null);
}

/** The one sentence of a reading that is withheld, with its first reason. */
export function withheldSentence(speaker: Speaker, at: string, stepDays: number, reason: string): string {
  return say(speaker.messages, speaker.language, 'withheld', { date: dateText(at, stepDays, speaker.language), reason });
}

/** About a month; else the longest age that the record can place. */
function spokenShare(younger: readonly ShareYounger[]): ShareYounger | undefined {
  const placed = younger.filter((entry) => entry.share !== null && entry.unplaced === 0);
  return placed.find((entry) => entry.days === SPOKEN_AGE) ?? placed[placed.length - 1] ?? younger[0];
}

function shareSentence({ messages, language }: Speaker, reading: Told, { days, share, unplaced, range }: ShareYounger): string | null {
  if (share === null) return null;
  const water =
    reading.of === 'discharge' ? say(messages, language, 'waterDischarge') : say(messages, language, 'waterOther', { name: reading.of });
  const values = { water, date: dateText(reading.at, reading.stepDays, language), period: daysText(days, language) };
  if (unplaced > WORTH_SAYING) {
    const whole = range ?? { low: share, high: share + unplaced };
    return say(messages, language, 'shareBetween', { ...values, ...litresRange(whole, 100), base: 100, sure: '' });
  }
  return sharePhrase({ messages, language }, share, range, values, { about: 'shareAbout', few: 'shareFew', nearlyAll: 'shareNearlyAll' });
}

function medianSentence({ messages, language }: Speaker, median: MedianAge, recordDays: number): string {
  const record = ageText(recordDays, language);
  if (median.beyondRecord) return say(messages, language, 'medianBeyond', { age: record });
  if (!median.range) {
    return say(messages, language, 'medianAbout', {
      age: ageText(median.days, language),
      sure: say(messages, language, 'sureNotAssessed'),
    });
  }
  if (median.range.highBeyondRecord)
    return say(messages, language, 'medianRangeOpen', { low: ageText(median.range.low, language), age: record });
  return say(messages, language, 'medianRange', ageRangeTexts(median.range.low, median.range.high, language));
}

function olderSentence(speaker: Speaker, { share, range }: Reading['olderThanRecord'], recordStart: string): string | null {
  if (share === null || Math.max(share, range?.high ?? 0) < WORTH_SAYING) return null;
  const month = monthText(recordStart, speaker.language);
  return sharePhrase(speaker, share, range, { month }, { about: 'olderAbout', few: 'olderFew', nearlyAll: 'olderNearlyAll' });
}

function assumedSentence(speaker: Speaker, share: number): string {
  return sharePhrase(speaker, share, null, {}, { about: 'assumedAbout', few: 'assumedFew', nearlyAll: 'assumedNearlyAll' });
}

function sharePhrase(
  { messages, language }: Speaker,
  share: number,
  range: Range | null,
  values: Record<string, string | number>,
  keys: Record<'about' | 'few' | 'nearlyAll', MessageKey>,
): string {
  const amount = litres(share, range);
  const base = amount.kind === 'about' ? amount.base : 100;
  const sure = range
    ? say(messages, language, 'sureRange', { ...litresRange(range, base), base })
    : say(messages, language, 'sureNotAssessed');
  if (amount.kind !== 'about') return say(messages, language, keys[amount.kind], { ...values, sure });
  return say(messages, language, keys.about, { ...values, sure, count: amount.count, base });
}
