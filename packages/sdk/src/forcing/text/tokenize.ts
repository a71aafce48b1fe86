import { RillageError } from '../../errors.js';

export interface Row {
  /** Line in the text at which the row begins, from 1. */
  line: number;
  cells: string[];
}

export interface Tokens {
  rows: Row[];
  /** Lines left out as remarks, with the text after the mark. */
  remarks: { line: number; text: string }[];
  /** Rows with text after a closing quote. */
  strayQuotes: number[];
  hadByteOrderMark: boolean;
}

export interface TokenRules {
  splitAt: ',' | ';' | '\t' | '|' | 'blanks';
  remarkMark: string;
  maxRows: number;
  maxColumns: number;
  /** Stop after so many rows; for a first look. */
  stopAfter?: number;
}

const QUOTE = 34;
const NEWLINE = 10;
const RETURN = 13;
const SPACE = 32;
const TAB = 9;

/**
 * Rows of cells from delimited text, quoted as RFC 4180 has it; blank and remark lines left out; any of the three line ends.
 * Cells are trimmed unless quoted. Work is linear in the text's length.
 * @throws RillageError 'unclosed-quote' | 'too-many-rows' | 'too-many-columns'
 * @source RFC 4180
 */
export function tokenize(text: string, rules: TokenRules): Tokens {
  const tokens: Tokens = { rows: [], remarks: [], strayQuotes: [], hadByteOrderMark: text.charCodeAt(0) === 0xfeff };
  const cursor = { at: tokens.hadByteOrderMark ? 1 : 0, line: 1 };
  while (cursor.at < text.length && tokens.rows.length < (rules.stopAfter ?? Infinity)) {
    const contentAt = skipBlanks(text, cursor.at, rules.splitAt);
    if (contentAt >= text.length || isLineEnd(text.charCodeAt(contentAt))) {
      nextLine(text, cursor, contentAt);
    } else if (rules.remarkMark !== '' && text.startsWith(rules.remarkMark, contentAt)) {
      const end = lineEnd(text, contentAt);
      tokens.remarks.push({ line: cursor.line, text: text.slice(contentAt + rules.remarkMark.length, end).trim() });
      nextLine(text, cursor, end);
    } else {
      if (rules.splitAt === 'blanks') cursor.at = contentAt;
      readRow(text, cursor, rules, tokens);
    }
  }
  return tokens;
}

function readRow(text: string, cursor: { at: number; line: number }, rules: TokenRules, tokens: Tokens): void {
  const blanks = rules.splitAt === 'blanks';
  const delimiter = blanks ? SPACE : rules.splitAt.charCodeAt(0);
  const row: Row = { line: cursor.line, cells: [] };
  if (tokens.rows.length >= rules.maxRows) {
    throw new RillageError({ code: 'too-many-rows', row: row.line, expected: `at most ${rules.maxRows} rows`, received: 'more' });
  }
  for (;;) {
    if (row.cells.length >= rules.maxColumns) {
      throw new RillageError({
        code: 'too-many-columns',
        row: row.line,
        expected: `at most ${rules.maxColumns} columns`,
        received: 'more',
      });
    }
    const contentAt = skipBlanks(text, cursor.at, rules.splitAt);
    row.cells.push(
      text.charCodeAt(contentAt) === QUOTE
        ? quotedCell(text, cursor, contentAt, delimiter, row, tokens)
        : bareCell(text, cursor, delimiter, blanks),
    );
    if (blanks) cursor.at = skipBlanks(text, cursor.at, 'blanks');
    const code = text.charCodeAt(cursor.at);
    if (cursor.at >= text.length || isLineEnd(code)) break;
    if (!blanks) cursor.at += 1;
  }
  tokens.rows.push(row);
  nextLine(text, cursor, cursor.at);
}

function bareCell(text: string, cursor: { at: number }, delimiter: number, blanks: boolean): string {
  let end = cursor.at;
  for (; end < text.length; end++) {
    const code = text.charCodeAt(end);
    if (code === delimiter || isLineEnd(code) || (blanks && code === TAB)) break;
  }
  const cell = text.slice(cursor.at, end).trim();
  cursor.at = end;
  return cell;
}

/** Leaves the cursor at the delimiter or line end after the cell. */
function quotedCell(
  text: string,
  cursor: { at: number; line: number },
  openAt: number,
  delimiter: number,
  row: Row,
  tokens: Tokens,
): string {
  let content = '';
  let at = openAt + 1;
  for (;;) {
    const close = text.indexOf('"', at);
    if (close < 0) {
      throw new RillageError({
        code: 'unclosed-quote',
        row: cursor.line,
        expected: 'a closing quote',
        received: text.slice(openAt, openAt + 60),
        hint: 'Double a quote that belongs to the text, or close the cell.',
      });
    }
    content += text.slice(at, close);
    if (text.charCodeAt(close + 1) !== QUOTE) {
      at = close + 1;
      break;
    }
    content += '"';
    at = close + 2;
  }
  for (let index = openAt; index < at; index++) {
    const code = text.charCodeAt(index);
    if (code === NEWLINE || (code === RETURN && text.charCodeAt(index + 1) !== NEWLINE)) cursor.line += 1;
  }
  const after = at;
  while (at < text.length && text.charCodeAt(at) !== delimiter && !isLineEnd(text.charCodeAt(at))) at += 1;
  const stray = text.slice(after, at).trim();
  if (stray !== '') tokens.strayQuotes.push(row.line);
  cursor.at = at;
  return content + stray;
}

function isLineEnd(code: number): boolean {
  return code === NEWLINE || code === RETURN;
}

function lineEnd(text: string, from: number): number {
  let at = from;
  while (at < text.length && !isLineEnd(text.charCodeAt(at))) at += 1;
  return at;
}

function nextLine(text: string, cursor: { at: number; line: number }, end: number): void {
  cursor.at = end + (text.charCodeAt(end) === RETURN && text.charCodeAt(end + 1) === NEWLINE ? 2 : 1);
  cursor.line += 1;
}

/** A tab is a delimiter in a file of tabs, and a blank elsewhere. */
function skipBlanks(text: string, from: number, splitAt: TokenRules['splitAt']): number {
  let at = from;
  for (; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code !== SPACE && code !== 0xa0 && !(code === TAB && splitAt !== '\t')) break;
  }
  return at;
}
