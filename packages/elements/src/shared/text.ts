/**
 * A text from a file as it may be shown: no control characters, no marks that turn the writing direction of what follows, bounded in
 * length. Markup stays as the characters it is; templates put it in as text.
 */
export function cleanText(text: unknown, most = 400): string {
  if (typeof text !== 'string') return '';
  const plain = text
    .slice(0, 4 * most)
    .replace(unsafe, '')
    .replace(/\s+/g, ' ')
    .trim();
  return plain.length > most ? plain.slice(0, most).replace(/[\uD800-\uDBFF]$/, '') + '…' : plain;
}

// C0 and C1 controls but tab and line ends, zero-width and invisible operators, embeddings, overrides and isolates, the byte order mark.
// eslint-disable-next-line no-control-regex
const unsafe = /[\u0000-\u0008\u000B\u000C\u000E-\u001F\u007F-\u009F\u200B\u2028-\u202E\u2060-\u206F\uFEFF\uFFF9-\uFFFB]/g;
