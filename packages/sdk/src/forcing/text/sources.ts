import { RillageError } from '../../errors.js';
import type { Notebook } from '../findings.js';

/** A text as it is, its bytes, or either with a name to call it by. */
export type SourceInput = string | Uint8Array | { name: string; text: string | Uint8Array };
/** One source or several, in the order of the layout's. */
export type Sources = SourceInput | readonly SourceInput[];

export interface SourceText {
  name: string;
  /** With its byte-order mark, if it had one. */
  text: string;
}

/** 64 MB: twenty years of quarter-hours in one file have about a third of that. */
export const DEFAULT_BYTES = 64_000_000;

/**
 * The texts of all sources, decoded, each below the cap and neither empty nor a web page.
 * Bytes are taken as UTF-8, as UTF-16 where a byte-order mark says so, else as Windows-1252, which is reported.
 * @throws RillageError 'source-invalid' | 'too-large' | 'empty-file' | 'html-instead' | 'binary-file'
 */
export function takeSources(sources: Sources, notebook: Notebook, capBytes = DEFAULT_BYTES): SourceText[] {
  const list: readonly unknown[] = Array.isArray(sources) ? (sources as readonly unknown[]) : [sources];
  if (list.length === 0) throw new RillageError({ code: 'empty-file', path: 'sources', expected: 'at least one source', received: 'none' });
  const texts = list.map((source, index) => takeOne(source, index, notebook, capBytes));
  notebook.stopIfAny();
  return texts;
}

function takeOne(source: unknown, index: number, notebook: Notebook, capBytes: number): SourceText {
  const named =
    typeof source === 'object' && source !== null && !(source instanceof Uint8Array) ? (source as Record<string, unknown>) : null;
  const name = typeof named?.['name'] === 'string' && named['name'] !== '' ? named['name'] : `source ${index + 1}`;
  const content = named ? named['text'] : source;
  if (typeof content !== 'string' && !(content instanceof Uint8Array)) {
    notebook.problem({ code: 'source-invalid', path: name, expected: 'a text or its bytes', received: typeof content });
    return { name, text: '' };
  }
  if (content.length > capBytes) {
    notebook.problem({
      code: 'too-large',
      path: name,
      expected: `at most ${capBytes} bytes`,
      received: `${content.length}${typeof content === 'string' ? ' characters' : ' bytes'}`,
      hint: 'Cut the record into shorter files, or raise limits.bytes in the layout.',
    });
    return { name, text: '' };
  }
  const text = typeof content === 'string' ? content : decode(content, name, notebook);
  inspect(text, name, notebook);
  return { name, text };
}

function decode(bytes: Uint8Array, name: string, notebook: Notebook): string {
  const encoding = bytes[0] === 0xff && bytes[1] === 0xfe ? 'utf-16le' : bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : 'utf-8';
  try {
    const text = new TextDecoder(encoding, { fatal: true, ignoreBOM: true }).decode(bytes);
    if (encoding !== 'utf-8') noteEncoding(name, encoding, notebook, 'note');
    return text;
  } catch {
    noteEncoding(name, 'windows-1252', notebook, 'warning');
    return new TextDecoder('windows-1252').decode(bytes);
  }
}

function noteEncoding(name: string, encoding: string, notebook: Notebook, severity: 'note' | 'warning'): void {
  notebook.note({
    code: 'encoding',
    severity,
    where: name,
    seen: encoding === 'windows-1252' ? 'bytes that are not UTF-8' : `a byte-order mark of ${encoding}`,
    done: `read as ${encoding}`,
    settle: 'Hand over the text itself, decoded, if it was written otherwise.',
  });
}

function inspect(text: string, name: string, notebook: Notebook): void {
  const head = text
    .slice(0, 2000)
    .replace(/^\uFEFF/, '')
    .trimStart();
  if (head === '' && text.trim().replace(/^\uFEFF/, '') === '') {
    notebook.problem({ code: 'empty-file', path: name, expected: 'rows of values', received: 'nothing but blanks' });
  } else if (/^<(!doctype\s+html|html|head|body|\?xml[^>]*>\s*<(!doctype\s+html|html))/i.test(head)) {
    notebook.problem({
      code: 'html-instead',
      path: name,
      expected: 'rows of values',
      received: head.slice(0, 60),
      hint: 'This is a web page, perhaps an error or sign-in page saved under the name of the file. Fetch the file again.',
    });
  } else if (head.includes('\0')) {
    notebook.problem({
      code: 'binary-file',
      path: name,
      expected: 'a text',
      received: 'zero bytes',
      hint: 'A spreadsheet or archive must be saved as a text with delimiters first; UTF-16 needs its byte-order mark.',
    });
  }
}
