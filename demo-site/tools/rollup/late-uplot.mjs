const lateId = '\0late-uplot';

/**
 * Keeps uPlot unevaluated until `import('uplot')` is called, in a build of one file. uPlot throws at import where `navigator.language`
 * is no valid tag; Rollup would hoist its body to the top of the file and every element would fail with it. The module is put in a
 * function behind an exported `then`, which an import expression calls. Fails the build where uPlot is imported statically.
 */
export function lateUplot() {
  return {
    name: 'late-uplot',
    resolveDynamicImport(specifier) {
      return specifier === 'uplot' ? lateId : null;
    },
    resolveId(specifier, importer) {
      if (specifier === lateId) return lateId;
      if (specifier === 'uplot' && importer !== lateId)
        this.error(`${importer} imports uplot statically; use import('uplot') inside a try`);
      return null;
    },
    async load(id) {
      if (id !== lateId) return null;
      const path = await this.resolve('uplot', lateId, { skipSelf: true });
      const { code } = await this.load({ id: path.id });
      const body = code.replace(/export\s*\{\s*uPlot as default\s*\};?\s*$/, 'return uPlot;');
      if (body === code) this.error('the export of uplot has moved; see demo-site/tools/rollup/late-uplot.mjs');
      return [
        `const evaluate = () => {\n${body}\n};`,
        'let made;',
        'export function then(settle, refuse) {',
        '  try { settle({ default: (made ??= evaluate()) }); } catch (reason) { refuse(reason); }',
        '}',
      ].join('\n');
    },
  };
}
