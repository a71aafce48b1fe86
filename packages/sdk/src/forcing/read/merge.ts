import type { Notebook } from '../findings.js';
import type { NamedPieces } from './assemble.js';
import { day } from './grid.js';

/** Joins pieces of one series that several files bring, one stretch of time each. What overlaps is a problem. */
export function mergePieces(series: readonly NamedPieces[], notebook: Notebook): NamedPieces[] {
  const byName = new Map<string, NamedPieces[]>();
  for (const each of series) byName.set(each.name, [...(byName.get(each.name) ?? []), each]);
  return [...byName.values()].map((parts) => (parts.length === 1 ? parts[0] : mergeParts(parts, notebook)));
}

function mergeParts(parts: NamedPieces[], notebook: Notebook): NamedPieces {
  const sorted = parts.filter(({ pieces }) => pieces.from.length > 0).sort((a, b) => a.pieces.from[0] - b.pieces.from[0]);
  const whole = sorted[0] ?? parts[0];
  const where = sorted.map(({ pieces }) => pieces.where).join(' + ');
  sorted.forEach(({ holds, pieces }, index) => {
    const before = sorted[index - 1]?.pieces;
    if (holds === whole.holds && (!before || before.to[before.to.length - 1] <= pieces.from[0])) return;
    notebook.problem({
      code: 'series-twice',
      path: whole.name,
      row: pieces.rows[0],
      expected: 'one series of a name, or files that follow one another in time',
      received: `${pieces.where} from ${day(pieces.from[0])} beside ${before?.where ?? whole.pieces.where}`,
      hint: 'Let all but one of the columns hold "ignored", or give them different names.',
    });
  });
  if (sorted.length < 2) return whole;
  const join = (key: 'from' | 'to' | 'first' | 'last'): Float64Array => Float64Array.from(sorted.flatMap(({ pieces }) => [...pieces[key]]));
  const rows = Int32Array.from(sorted.flatMap(({ pieces }) => [...pieces.rows]));
  notebook.note({
    code: 'series-joined',
    severity: 'note',
    where,
    seen: `${sorted.length} files with one series`,
    done: `joined as ${whole.name}`,
  });
  return { ...whole, pieces: { where, from: join('from'), to: join('to'), first: join('first'), last: join('last'), rows } };
}
