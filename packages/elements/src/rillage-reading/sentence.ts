import type { Reading } from '@rillage/sdk';
import type { AmountKey } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { cleanText } from '../shared/text.js';

/** A statement in words: the sentence that says it, what follows, and the language they are in. */
export interface Statement {
  lead: string;
  rest: string[];
  language: string;
}

/**
 * The reading's own sentences where they are in the page's language, else the same said from the numbers. Until the part that says them has
 * loaded, or where it cannot be, the file's own, marked as what they are.
 * @param days    the age limit the sentence is about
 * @param loaded  called when the part has come
 */
export function statement(language: Language<AmountKey>, reading: Reading, days: number, timeZone: string, loaded: () => void): Statement {
  const written = ownSentences(reading);
  const fits = language.speaks(reading.language) && written.length > 0;
  if (!fits && !composing) void loadComposing().then((came) => came && loaded());
  const composed = fits || !composing ? null : composing.compose(language, reading, days, timeZone);
  const [lead = '', ...rest] = composed ?? written;
  return { lead, rest, language: composed || fits ? language.tag : cleanText(reading.language, 20) };
}

let composing: typeof import('./compose.js') | null = null;

async function loadComposing(): Promise<boolean> {
  try {
    composing = await import('./compose.js');
    return true;
  } catch {
    return false;
  }
}

/** The file's own sentences; one text where it does not give them singly. */
function ownSentences({ sentence, sentences }: Reading): string[] {
  return (sentences?.length ? sentences : [sentence]).map((one) => cleanText(one, 1200)).filter((one) => one !== '');
}
