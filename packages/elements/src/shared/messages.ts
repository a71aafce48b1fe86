/** A text with `{placeholders}`, or one text per plural category, chosen by the value of `count`. */
export type Message = string | (Partial<Record<Intl.LDMLPluralRule, string>> & { other: string });
/** Messages by key; keys open with the element they belong to, `reading.lead`. */
export type Messages = Record<string, Message>;

/**
 * Adds messages for a language, over those that are there. A page may replace one sentence or bring a whole language.
 * Elements on the page show them from their next update; `addMessages` of the package's index asks them to.
 */
export function putMessages(language: string, messages: Messages): void {
  const key = primary(language);
  page.set(key, { ...page.get(key), ...messages });
}

export function hasCatalogue(language: string): boolean {
  const key = primary(language);
  return key === 'en' || page.has(key) || shipped.has(key);
}

/** What the page added over what is shipped; empty for English, whose words each element carries itself. */
export function catalogueFor(language: string): Messages {
  const key = primary(language);
  const added = page.get(key);
  const base = shipped.get(key) ?? none;
  return added ? { ...base, ...added } : base;
}

/** Fetches a shipped language on first use. Resolves true where it came with this call, never rejects: English stays. */
export async function loadCatalogue(language: string): Promise<boolean> {
  const key = primary(language);
  if (shipped.has(key) || !Object.hasOwn(loaders, key)) return false;
  try {
    const { messages } = await loaders[key as keyof typeof loaders]();
    shipped.set(key, messages);
    return true;
  } catch {
    return false;
  }
}

/** Puts values into a message. Values are never read as messages themselves. */
export function fill(message: Message, values: Record<string, string | number>, language: string): string {
  const text = typeof message === 'string' ? message : (message[pluralOf(values['count'], language)] ?? message.other);
  return text.replace(/\{(\w+)\}/g, (whole, name: string) => (Object.hasOwn(values, name) ? shown(values[name]!, language) : whole));
}

const loaders = {
  de: () => import('../languages/de.js'),
  ar: () => import('../languages/ar.js'),
};
const none: Messages = {};
const page = new Map<string, Messages>();
const shipped = new Map<string, Messages>();

const primary = (tag: string): string => tag.toLowerCase().split(/[-_]/)[0]!;

function pluralOf(count: string | number | undefined, language: string): Intl.LDMLPluralRule {
  return typeof count === 'number' ? new Intl.PluralRules(language).select(count) : 'other';
}

const shown = (value: string | number, language: string): string =>
  typeof value === 'number' ? new Intl.NumberFormat(language).format(value) : value;
