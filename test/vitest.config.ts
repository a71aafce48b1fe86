import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const at = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

export default defineConfig({
  root: at('..'),
  resolve: { alias: { '@rillage/sdk': at('../packages/sdk/src/index.ts') } },
  test: {
    include: ['test/**/*.test.ts'],
    exclude: ['test/browser/**', 'node_modules/**'],
    env: { TZ: 'UTC' },
    testTimeout: 30_000,
  },
});
