import { shorten } from '../../errors.js';
import type { Notebook } from '../findings.js';
import type { SettledSource } from '../layout.js';
import type { Row } from '../text/tokenize.js';

/**
 * Puts the layout's edits in place of the cells they name, in `rows`, before anything else reads them. Each is a finding with what was there
 * and what stands now; one whose row or column does not exist is a problem. A row shorter than the widest takes an edit as far as that reaches:
 * its cells at the end are absent, not non-existent.
 */
export function applyEdits(rows: readonly Row[], source: SettledSource, notebook: Notebook): void {
  if (source.edits.length === 0) return;
  const byLine = new Map(rows.map((row) => [row.line, row]));
  const width = rows.reduce((widest, { cells }) => Math.max(widest, cells.length), 0);
  const names = rows[source.namesRow - 1]?.cells ?? [];
  for (const { row: line, position, value, why } of source.edits) {
    const row = byLine.get(line);
    if (!row || position > width) {
      notebook.problem({
        code: 'edit-misplaced',
        path: source.name,
        row: line,
        expected: row ? `a column from 1 to ${width}` : 'a row with cells: no remark, no blank line, not beyond the end',
        received: row ? `column ${position}` : `row ${line}`,
        hint: 'The edit is of another file, or the file has changed since. Take it out of edits, or name the cell it means.',
      });
      continue;
    }
    const before = row.cells[position - 1] ?? '';
    while (row.cells.length < position) row.cells.push('');
    row.cells[position - 1] = value;
    const name = names[position - 1] ?? '';
    notebook.note({
      code: 'cell-edited',
      severity: 'warning',
      where: `${source.name}: ${name === '' ? `column ${position}` : shorten(name, 60)}`,
      rows: [line],
      count: 1,
      seen: `${quoted(before)} in the file`,
      done: `${quoted(value)} stands in its place${why === '' ? '' : `: ${shorten(why, 400)}`}`,
      settle: 'Take the edit out of edits to read the file as it is.',
    });
  }
}

function quoted(text: string): string {
  return JSON.stringify(shorten(text, 100));
}
