/** The trusted-types policy of the single-file build. Pages name it in their header; see demo-site/policy.mjs. */
export const policyName = 'rillage-lit';

/**
 * Renames the trusted-types policy of the bundled copy of Lit. A page that names `trusted-types` without `'allow-duplicates'` refuses a
 * second policy of one name, so a page with a Lit of its own would otherwise break at import. Fails the build where the call has moved.
 */
export function ownPolicy() {
  let renamed = 0;
  return {
    name: 'own-policy',
    buildStart() {
      renamed = 0;
    },
    transform(code, id) {
      if (!/[\\/]lit-html[\\/]/.test(id) || !code.includes('createPolicy')) return null;
      const changed = code.replace(/createPolicy\((["'])lit-html\1/g, () => {
        renamed += 1;
        return `createPolicy('${policyName}'`;
      });
      return { code: changed, map: null };
    },
    generateBundle(_, bundle) {
      const code = Object.values(bundle)
        .map((file) => file.code ?? '')
        .join('');
      // the SDK has a policy of its own for workers
      if (!code.replaceAll(/createPolicy\(["']rillage-worker/g, '').includes('createPolicy')) return;
      if (renamed !== 1 || /createPolicy\((["'])lit-html/.test(code)) {
        this.error(`Lit's trusted-types policy was found ${renamed} times, expected once; see demo-site/tools/rollup/own-policy.mjs`);
      }
    },
  };
}
