import { policyName } from './tools/rollup/own-policy.mjs';

/** The strictest content security policy under which the single-file build works; the exact header for an embedding page to send.
 * `rillage-worker` is for pages that compute: without it, or without a worker, the work is done in slices of the page's own time. */
export const contentSecurityPolicy = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src 'self'",
  "connect-src 'self'",
  "img-src 'self'",
  "base-uri 'none'",
  "require-trusted-types-for 'script'",
  `trusted-types ${policyName} rillage-worker`,
].join('; ');
