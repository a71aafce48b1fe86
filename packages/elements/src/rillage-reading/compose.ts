import type { Reading } from '@rillage/sdk';
import { age, ageSpan, amountMessages, date, dayCount, moment, type AmountKey } from '../shared/format.js';
import { frequency } from '../shared/frequency.js';
import { cleanText } from '../shared/text.js';
import type { Language } from '../shared/language.js';
import { composeMessages, type ComposeKey } from './compose-messages.js';
import { headline, negligible } from './headline.js';

interface Speech extends Pick<Language<ComposeKey>, 'tag' | 'speaks'> {
  say: (key: ComposeKey, values?: Record<string, string | number>) => string;
}

/**
 * Sentences from the numbers of a reading: share within `days`, median, share beyond the record. Loaded only where the page's language is not
 * that of the file's own sentences.
 */
export function compose(language: Language<AmountKey>, reading: Reading, days: number, timeZone: string): string[] {
  const english = { ...amountMessages, ...composeMessages };
  const speech: Speech = {
    tag: language.tag,
    speaks: (other) => language.speaks(other),
    say: (key, values) => language.sayFrom(english, key, values),
  };
  const day = moment(speech.tag, reading.at, reading.stepDays, timeZone);
  if (reading.status === 'withheld') return [speech.say('reading.withheld', { date: day }), ...reasons(speech, reading)];
  const month = date(speech.tag, reading.evidence.recordFrom, { year: 'numeric', month: 'long' }, timeZone);
  return [
    lead(speech, reading, days, day),
    median(speech, reading, month),
    beyond(speech, reading, month),
    assumed(speech, reading),
  ].filter((text) => text !== '');
}

/** Why a reading is withheld: known codes in the page's language, others in the file's words. */
function reasons(speech: Speech, reading: Reading): string[] {
  return reading.withheld.map(({ code, because }) => {
    const own = speech.speaks(reading.language) ? cleanText(because) : '';
    if (own) return own;
    return known.has(code) ? speech.say(`reading.${code}` as ComposeKey) : cleanText(because) || cleanText(code, 60);
  });
}

const known = new Set([
  'noOutflow',
  'recordTooShort',
  'storageRunsDown',
  'preRecordDominates',
  'samplesTooOld',
  'fitNotConverged',
  'notAssessed',
]);

function lead(speech: Speech, reading: Reading, days: number, day: string): string {
  const younger = headline(reading, days);
  if (!younger || younger.share === null) return speech.say('reading.withheld', { date: day });
  const water =
    reading.of === 'discharge' ? speech.say('reading.stream') : speech.say('reading.outflow', { of: cleanText(reading.of, 60) });
  const values = { water, date: day, period: dayCount(speech, younger.days) };
  if (younger.unplaced > negligible) {
    const whole = younger.range ?? { low: younger.share, high: younger.share + younger.unplaced };
    return speech.say('reading.leadBetween', { ...values, low: Math.floor(whole.low * 100), high: Math.ceil(whole.high * 100), of: 100 });
  }
  const { count, of, bound, low, high } = frequency(younger.share, younger.range);
  const key = bound === 'fewer' ? 'reading.leadFewer' : bound === 'more' ? 'reading.leadMore' : 'reading.lead';
  const range = low === null || high === null ? speech.say('amount.unassessed') : speech.say('reading.likely', { low, high, of });
  return speech.say(key, { ...values, count, of, range });
}

function median(speech: Speech, { median: it }: Reading, month: string): string {
  if (!it) return '';
  if (it.beyondRecord) return speech.say('reading.halfBeyond', { month });
  if (!it.range) return speech.say('reading.halfAbout', { age: age(speech, it.days) });
  return speech.say('reading.half', { age: ageSpan(speech, it.range.low, it.range.high, it.range.highBeyondRecord) });
}

function beyond(speech: Speech, { olderThanRecord: { share, range } }: Reading, month: string): string {
  if (share === null || Math.max(share, range?.high ?? 0) < negligible) return '';
  const { count, of, bound, low, high } = frequency(share, range);
  const sure = low === null || high === null ? speech.say('amount.unassessed') : speech.say('reading.likely', { low, high, of });
  return speech.say(bound === 'fewer' ? 'reading.beyondFewer' : bound === 'more' ? 'reading.beyondMore' : 'reading.beyond', {
    count,
    of,
    month,
    range: sure,
  });
}

function assumed(speech: Speech, { assumedShare }: Reading): string {
  if (assumedShare <= negligible) return '';
  const { count, of } = frequency(assumedShare, null);
  return speech.say('reading.assumed', { count, of });
}
