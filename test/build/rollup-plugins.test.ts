import { rollup, type Plugin } from 'rollup';
import { describe, expect, it } from 'vitest';
import resolve from '@rollup/plugin-node-resolve';
import { lines } from '../../demo-site/tools/rollup/lines.mjs';
import { narrowTemplates } from '../../demo-site/tools/rollup/narrow-templates.mjs';
import { ownPolicy } from '../../demo-site/tools/rollup/own-policy.mjs';
import { at } from '../../demo-site/tools/paths.mjs';

async function bundle(code: string, plugins: unknown[]): Promise<string> {
  const path = at('entry-of-a-test.js');
  const built = await rollup({ input: path, plugins: [lines(path, code), ...plugins] as Plugin[], onLog: () => undefined });
  const { output } = await built.generate({ format: 'es', inlineDynamicImports: true });
  return output[0].code;
}

/** A module as if it lay where `id` says. */
const moduleAt = (id: string, code: string): Plugin => ({
  name: 'module-at',
  resolveId: (each) => (each === id ? id : null),
  load: (each) => (each === id ? code : null),
});

describe('ownPolicy', () => {
  it('gives the bundled Lit a policy name of its own', async () => {
    const code = await bundle("export { html } from 'lit';", [ownPolicy(), resolve({ exportConditions: ['production'] })]);
    expect(code).toContain("createPolicy('rillage-lit'");
    expect(code).not.toMatch(/createPolicy\(["']lit-html/);
  });

  it('fails the build where the call has moved', async () => {
    const id = '/node_modules/lit-html/lit-html.js';
    const moved = moduleAt(id, 'export const policy = trustedTypes.createPolicy(name, {});');
    await expect(bundle(`export * from '${id}';`, [ownPolicy(), moved])).rejects.toThrow('found 0 times');
  });

  it('fails the build where a second copy of Lit is in it', async () => {
    const copy = (id: string): Plugin => moduleAt(id, 'export const policy = trustedTypes.createPolicy("lit-html", {});');
    const [one, two] = ['/a/node_modules/lit-html/lit-html.js', '/b/node_modules/lit-html/lit-html.js'] as const;
    const entry = `export * as one from '${one}'; export * as two from '${two}';`;
    await expect(bundle(entry, [ownPolicy(), copy(one), copy(two)])).rejects.toThrow('found 2 times');
  });
});

describe('narrowTemplates', () => {
  it('takes indentation out of templates, and leaves their lines and blanks', async () => {
    const code = await bundle('export const css = `a {\n      b: c  d;\n    }`;', [narrowTemplates()]);
    expect(code).toContain('`a {\nb: c  d;\n}`');
  });
});
