import type { Reading } from '@rillage/sdk';
import type { AmountKey } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { later } from '../shared/later.js';
import { cleanText } from '../shared/text.js';

/** A statement in words: the sentence that says it, what follows, and the language they are in. */
export interface Statement {
  lead: string;
  rest: string[];
  language: string;
  /** Other words are on their way. */
  coming: boolean;
}

/**
 * The reading's own sentences where they are in the page's language, else the same said from the numbers. Until the part that says them has
 * come, or where it cannot be had, the file's own, marked as what they are.
 * @param days  the age limit the sentence is about
 * @param came  called when the part has come
 */
export function statement(language: Language<AmountKey>, reading: Reading, days: number, timeZone: string, came: () => void): Statement {
  const written = ownSentences(reading);
  const fits = language.speaks(reading.language) && written.length > 0;
  const part = fits ? null : composing(came);
  const [lead = '', ...rest] = part ? part.compose(language, reading, days, timeZone) : written;
  return { lead, rest, language: part || fits ? language.tag : cleanText(reading.language, 20), coming: part === undefined };
}

const composing = later(() => import('./compose.js'));

/** The file's own sentences; one text where it does not give them singly. */
function ownSentences({ sentence, sentences }: Reading): string[] {
  return (sentences?.length ? sentences : [sentence]).map((one) => cleanText(one, 1200)).filter((one) => one !== '');
}
