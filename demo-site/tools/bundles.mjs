import { rollup } from 'rollup';
import { bundles, optionsFor } from '../../rollup.config.mjs';
import { at, filesUnder } from './paths.mjs';
import { onChange } from './stamp.mjs';

/** Makes every single-file build whose inputs have changed. */
export async function buildBundles() {
  const modules = ['sdk', 'elements'].flatMap((name) => filesUnder(at(`packages/${name}/dist`)).filter((path) => isModule(path)));
  const tools = [
    at('rollup.config.mjs'),
    at('package-lock.json'),
    at('packages/sdk/package.json'),
    at('packages/elements/package.json'),
    ...filesUnder(at('demo-site/tools/rollup')),
  ];
  const present = bundles();
  return onChange({
    name: 'bundles',
    inputs: [...modules, ...tools],
    outputs: present.map((bundle) => bundle.file),
    async work() {
      const failures = [];
      for (const bundle of present) await writeBundle(bundle).catch((reason) => failures.push(`${bundle.name}: ${reason.message}`));
      if (failures.length > 0) throw new Error(failures.join('\n'));
    },
  });
}

/** Makes one single-file build. */
export async function writeBundle(bundle) {
  const { output, ...options } = optionsFor(bundle);
  const built = await rollup(options);
  await built.write(output);
  await built.close();
}

const isModule = (path) => path.endsWith('.js') && !path.endsWith('.min.js');
