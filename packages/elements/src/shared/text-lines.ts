import { svg, type TemplateResult } from 'lit';

/** A text broken between words to lines of at most some width, at about 0.55 em a letter; a longer word stands alone. */
export function textLines(text: string, width: number, em: number): string[] {
  const most = Math.max(4, Math.floor(width / (0.55 * em)));
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const last = lines[lines.length - 1];
    if (last !== undefined && last.length + 1 + word.length <= most) lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  return lines;
}

/** Height of a line, em. */
export const lineHeight = 1.2;

/** Lines of SVG text, the first (or, with `above`, the last) on the baseline y. */
export function linesAt(lines: string[], x: number, y: number, em: number, above = false): TemplateResult {
  const first = above ? y - (lines.length - 1) * lineHeight * em : y;
  return svg`${lines.map((line, index) => svg`<text x=${x} y=${first + index * lineHeight * em}>${line}</text>`)}`;
}
