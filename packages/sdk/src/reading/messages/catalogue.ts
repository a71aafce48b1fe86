import { RillageError } from '../../errors.js';
import { english } from './en.js';

/**
 * One message: a text with `{names}` in braces, or such a text for each plural category of its language (Intl.PluralRules), chosen by the value
 * `count`. `other` is always there.
 */
export type Message = string | (Partial<Record<Intl.LDMLPluralRule, string>> & { other: string });

/** The keys a language needs; what each may name is written beside the English text. */
export type MessageKey = keyof typeof english;
export type Messages = Record<MessageKey, Message>;

/** Languages by primary subtag. Another one is another file like en.ts and a line here. */
const CATALOGUES: Readonly<Record<string, Messages>> = { en: english };

/**
 * The messages of a language, with the caller's own laid over them.
 * @throws RillageError 'unknown-language' where the tag is no language tag, or no messages are known and none are given
 */
export function messagesFor(language: string, own: Partial<Messages> = {}): Messages {
  let primary: string;
  try {
    primary = new Intl.Locale(language).language;
  } catch (cause) {
    throw new RillageError(
      { code: 'unknown-language', path: 'language', expected: 'a language tag such as en or en-GB', received: language },
      { cause },
    );
  }
  const known = Object.hasOwn(CATALOGUES, primary) ? CATALOGUES[primary] : undefined;
  if (!known && Object.keys(own).length === 0) {
    throw new RillageError({
      code: 'unknown-language',
      path: 'language',
      expected: `one of ${Object.keys(CATALOGUES).join(', ')}`,
      received: language,
      hint: 'Pass messages of your own for another language.',
    });
  }
  return { ...english, ...known, ...own };
}

/** The message with its names filled in. Numbers are written as the language writes them; `count` chooses the plural. */
export function say(messages: Messages, language: string, key: MessageKey, values: Record<string, string | number> = {}): string {
  const message = messages[key];
  let text: string;
  if (typeof message === 'string') text = message;
  else {
    const count = Number(values['count'] ?? 0);
    text = message[new Intl.PluralRules(language).select(count)] ?? message.other;
  }
  return text.replace(/\{(\w+)\}/g, (whole, name: string) => {
    if (!Object.hasOwn(values, name)) return whole;
    const value = values[name] as string | number;
    return typeof value === 'number' ? new Intl.NumberFormat(language).format(value) : value;
  });
}
