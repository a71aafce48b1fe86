/** For the custom-elements analyzer, which is called by demo-site/tools/manifest.mjs. */
export default { globs: ['src/**/*.ts'], exclude: ['src/**/*.d.ts'], litelement: true, packagejson: false, quiet: true };
