/**
 * Takes the indentation out of templates: what follows a line end in a minified chunk of elements is within a template of HTML, SVG or CSS, where
 * one blank is as good as twenty. The line end stays, so words stay apart. Goes after the minifier, which leaves no other line ends but comments'.
 */
export function narrowTemplates() {
  return {
    name: 'narrow-templates',
    renderChunk: (code) => ({ code: code.replace(/\n[ \t]+/g, '\n'), map: null }),
  };
}
