import { cli } from '@custom-elements-manifest/analyzer/cli.js';
import { at, filesUnder } from './paths.mjs';
import { onChange } from './stamp.mjs';

/** Generates packages/elements/custom-elements.json from the docstrings of the elements. */
export function buildManifest() {
  const folder = at('packages/elements');
  const sources = filesUnder(`${folder}/src`).filter((path) => path.endsWith('.ts'));
  return onChange({
    name: 'manifest',
    inputs: [...sources, at('package-lock.json'), at('demo-site/tools/manifest.mjs')],
    outputs: sources.length > 0 ? [`${folder}/custom-elements.json`] : [],
    async work() {
      if (sources.length === 0) return;
      await cli({
        cwd: folder,
        argv: ['analyze', '--litelement', '--globs', 'src/**/*.ts', '--exclude', 'src/**/*.d.ts', '--quiet'],
      });
    },
  });
}
