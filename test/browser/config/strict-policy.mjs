import { createHash } from 'node:crypto';
import { contentSecurityPolicy } from '../../../demo-site/policy.mjs';

/**
 * Sends the strict policy with every page whose test file, or own path, has a folder `csp` in it. The runner's own few inline scripts
 * are let through by hash, so that a test file under csp/ runs as a whole under the policy. Under `csp/unbundled/` the policy's name is
 * Lit's own, for tests of the modules as an application would bundle them; under `csp/own-lit/` both names are there, as on a page with a Lit
 * of its own.
 */
export async function strictPolicy(context, next) {
  // A module in a sandboxed frame, whose origin is opaque, is fetched across origins.
  context.set('Access-Control-Allow-Origin', '*');
  await next();
  if (!context.response.is('html') || typeof context.body !== 'string') return;
  const file = /testFile"?:\s*"([^"?]*)/.exec(context.body)?.[1] ?? context.path;
  if (!file.includes('/csp/')) return;
  const inline = [...context.body.matchAll(/<script(?![^>]*\ssrc=)[^>]*>([\s\S]*?)<\/script>/g)].map(([, code]) => `'${hashOf(code)}'`);
  const policy = contentSecurityPolicy.replace("script-src 'self'", ["script-src 'self'", ...inline].join(' '));
  const names = file.includes('/csp/unbundled/') ? 'lit-html' : file.includes('/csp/own-lit/') ? 'rillage-lit lit-html' : 'rillage-lit';
  context.set('Content-Security-Policy', policy.replace('rillage-lit', names));
}

const hashOf = (code) => `sha256-${createHash('sha256').update(code).digest('base64')}`;
