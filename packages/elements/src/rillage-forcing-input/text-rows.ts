/** A file as it came: its text, or its bytes, which the reader decodes and reports on. */
export interface ForcingFile {
  name: string;
  text: string | Uint8Array;
}

/** Number of lines; an end after the last begins no further one. */
export const lineCount = (file: ForcingFile): number => known(file).starts.length;

/** One line without its end, from 1; empty where there is none. */
export const lineAt = (file: ForcingFile, line: number): string => /^[^\r\n]*/.exec(from(file, line))![0];

/**
 * Cells of the row that begins at a line, quoted as RFC 4180 has it, trimmed as the reader trims them.
 * @param splitAt     `,` `;` `|`, a tab, or `blanks`
 * @param remarkMark  lines that begin so are no rows; '' for none
 * @returns null for a blank line, a remark, or none
 */
export function cellsAt(file: ForcingFile, line: number, splitAt = ',', remarkMark = '#'): string[] | null {
  const first = lineAt(file, line).trim();
  if (first === '' || (remarkMark !== '' && first.startsWith(remarkMark))) return null;
  const row = from(file, line);
  const blanks = splitAt === '\t' ? ' \\u00a0' : ' \\u00a0\\t';
  const ends = splitAt === 'blanks' ? ' \\t' : splitAt === '\t' ? '\\t' : `\\${splitAt}`;
  const between = splitAt === 'blanks' ? `[${blanks}]+(?=[^${blanks}\\r\\n])` : ends;
  const cell = new RegExp(`[${blanks}]*(?:"((?:[^"]|"")*)"([^${ends}\\r\\n]*)|([^${ends}\\r\\n]*))(${between})?`, 'y');
  const cells: string[] = [];
  for (;;) {
    const [, quoted, stray, bare, more] = cell.exec(row)!;
    cells.push(quoted === undefined ? bare!.trim() : quoted.replaceAll('""', '"') + stray!.trim());
    if (more === undefined || cells.length >= mostCells) return cells;
  }
}

/** How a file's rows are told apart, as its layout says. */
interface RowRules {
  splitAt?: string;
  remarkMark?: string;
  namesRow?: number;
}

/** The cells of the names row, which a layout counts without remarks and blank lines; empty where there is none. */
export function namesOf(file: ForcingFile, { splitAt, remarkMark, namesRow = 1 }: RowRules): string[] {
  let row = 0;
  for (let line = 1; line <= Math.min(lineCount(file), mostHead) && namesRow > 0; line++) {
    const cells = cellsAt(file, line, splitAt, remarkMark);
    if (cells && ++row === namesRow) return cells;
  }
  return [];
}

/** What follows a line's beginning, as far as a row is looked at. */
function from(file: ForcingFile, line: number): string {
  const { text, starts } = known(file);
  const start = starts[line - 1];
  return start === undefined ? '' : text.slice(start, start + mostRow);
}

/** The text, decoded to be quoted from, with where its lines begin. What the reader makes of the bytes is a finding of its own. */
function known(file: ForcingFile): { text: string; starts: number[] } {
  let found = files.get(file);
  if (!found) {
    const text = (typeof file.text === 'string' ? file.text : decode(file.text)).replace(/^\uFEFF/, '');
    const starts = text === '' ? [] : [0];
    for (const { 0: end, index } of text.matchAll(/\r\n?|\n/g)) if (index + end.length < text.length) starts.push(index + end.length);
    files.set(file, (found = { text, starts }));
  }
  return found;
}

function decode(bytes: Uint8Array): string {
  const wide = bytes[0] === 0xff && bytes[1] === 0xfe ? 'utf-16le' : bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : null;
  try {
    return new TextDecoder(wide ?? 'utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
}

const files = new WeakMap<ForcingFile, { text: string; starts: number[] }>();
// A longer row is quoted and cut.
const mostRow = 20_000;
const mostCells = 1000;
// Description above the names is seldom longer.
const mostHead = 500;
