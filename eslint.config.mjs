import { fileURLToPath } from 'node:url';
import typescript from 'typescript-eslint';
import { rillageRules } from './test/lint/rules.mjs';

const at = (path) => fileURLToPath(new URL(path, import.meta.url));

/** The arrows between the SDK's rooms: what each may import. A file of a room may always import its own room. */
const loose = ['contract', 'errors'];
const rooms = {
  contract: [],
  errors: ['contract'],
  numeric: [],
  units: [...loose, 'numeric'],
  forcing: [...loose, 'numeric', 'units'],
  selection: [...loose, 'numeric'],
  tracers: [...loose, 'numeric', 'selection'],
  column: [...loose, 'numeric', 'selection', 'tracers'],
  ages: [...loose, 'numeric', 'units', 'forcing', 'selection', 'tracers', 'column'],
  fit: [...loose, 'numeric', 'units', 'forcing', 'selection', 'tracers', 'column', 'ages'],
  outlook: [...loose, 'numeric', 'units', 'forcing', 'selection', 'tracers', 'column', 'ages', 'fit'],
  reading: [...loose, 'numeric', 'units', 'forcing', 'selection', 'tracers', 'column', 'ages', 'fit', 'outlook'],
  workers: [...loose, 'numeric', 'units', 'forcing', 'selection', 'tracers', 'column', 'ages', 'fit', 'outlook', 'reading'],
};

const evalBans = { 'no-eval': 'error', 'no-implied-eval': 'error', 'no-new-func': 'error' };

/** What would make two runs of the same numbers differ. */
const sdkSyntax = [
  ban("CallExpression[callee.object.name='Date'][callee.property.name='now']", 'The SDK has no clock; take the time as an argument.'),
  ban(
    "CallExpression[callee.object.name='performance'][callee.property.name='now']",
    'The SDK has no clock; take the time as an argument.',
  ),
  ban("CallExpression[callee.object.name='Math'][callee.property.name='random']", 'Randomness is seeded; use numeric/.'),
  ban("NewExpression[callee.name='Date'][arguments.length=0]", 'The SDK has no clock; take the time as an argument.'),
  ban("CallExpression[callee.name='Date']", 'The SDK has no clock; take the time as an argument.'),
  ban("CallExpression[callee.name='fetch']", 'The SDK uses no network; take the text as an argument.'),
];
const oneEngineOnly = [
  'process',
  'Buffer',
  'require',
  'global',
  '__dirname',
  'window',
  'document',
  'navigator',
  'localStorage',
  'Deno',
].map((name) => ({ name, message: 'The SDK runs in browsers, Node and Deno alike; only workers/ may look at where it runs.' }));
const elementSyntax = [
  ban('AssignmentExpression[left.property.name=/^(innerHTML|outerHTML)$/]', 'Refused by trusted types; use a template or textContent.'),
  ban("CallExpression[callee.property.name='insertAdjacentHTML']", 'Refused by trusted types; use a template.'),
  ban(
    "CallExpression[callee.property.name='setAttribute'][arguments.0.value='style']",
    'Refused by the strict policy; set a style property.',
  ),
  ban("CallExpression[callee.property.name=/^write(ln)?$/][callee.object.name='document']", 'Refused by trusted types.'),
  ban(
    "CallExpression[callee.object.name='customElements'][callee.property.name='define'][arguments.0.type='Literal']",
    'Define through the guarded helper.',
  ),
];
const testSyntax = [
  ban(
    'MemberExpression[object.name=/^(it|test|describe|suite|context|specify)$/][property.name=/^(skip|only|todo|skipIf|runIf|fails)$/]',
    'No test is skipped, singled out or expected to fail.',
  ),
  ban('CallExpression[callee.name=/^(xit|xtest|xdescribe|fdescribe|xcontext)$/]', 'No test is skipped or singled out.'),
  ban("CallExpression[callee.property.name='skip'][callee.object.type='ThisExpression']", 'No test is skipped.'),
];

export default typescript.config(
  {
    ignores: [
      '**/dist/',
      '**/node_modules/',
      'demo-site/public/lib/',
      'packages/elements/types/',
      'coverage/',
      '.cache/',
      'test/oracles/**/*.py',
    ],
  },
  { linterOptions: { reportUnusedDisableDirectives: 'error' }, plugins: { rillage: rillageRules } },
  {
    files: ['**/*.{js,mjs,ts}'],
    extends: [typescript.configs.base],
    rules: {
      ...evalBans,
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-var': 'error',
      'prefer-const': ['error', { destructuring: 'all' }],
      'no-debugger': 'error',
      'no-dupe-keys': 'error',
      'no-dupe-else-if': 'error',
      'no-duplicate-case': 'error',
      'no-fallthrough': 'error',
      'no-self-compare': 'off',
      'no-unreachable': 'error',
      'no-unsafe-finally': 'error',
      'no-unsafe-optional-chaining': 'error',
      'no-sparse-arrays': 'error',
      'no-control-regex': 'error',
      'use-isnan': 'error',
      'valid-typeof': 'error',
      'no-empty': 'error',
      'no-cond-assign': ['error', 'except-parens'],
      'no-constant-binary-expression': 'error',
      'no-throw-literal': 'error',
      'no-prototype-builtins': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true }],
    },
  },
  {
    files: ['**/*.ts'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/ban-ts-comment': [
        'error',
        { 'ts-expect-error': 'allow-with-description', 'ts-ignore': true, 'ts-nocheck': true },
      ],
      '@typescript-eslint/no-non-null-asserted-optional-chain': 'error',
      '@typescript-eslint/no-unnecessary-type-constraint': 'error',
      '@typescript-eslint/no-wrapper-object-types': 'error',
      '@typescript-eslint/no-unsafe-function-type': 'error',
      '@typescript-eslint/consistent-type-imports': ['error', { disallowTypeAnnotations: false, fixStyle: 'inline-type-imports' }],
    },
  },
  {
    files: ['packages/*/src/**/*.ts'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: at('.') } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': 'error',
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/no-for-in-array': 'error',
      'no-console': ['error', { allow: ['warn'] }],
    },
  },
  {
    files: ['packages/sdk/src/**/*.ts'],
    rules: {
      'rillage/arrows': ['error', { root: at('packages/sdk/src'), rooms, packages: [] }],
      'no-restricted-syntax': ['error', ...sdkSyntax],
      'no-restricted-globals': ['error', ...oneEngineOnly],
      'no-console': 'error',
    },
  },
  {
    files: ['packages/sdk/src/workers/**/*.ts'],
    rules: {
      'rillage/arrows': ['error', { root: at('packages/sdk/src'), rooms, packages: ['node:worker_threads'] }],
      'no-restricted-syntax': 'off',
      'no-restricted-globals': 'off',
    },
  },
  {
    files: ['packages/elements/src/**/*.ts'],
    rules: {
      'rillage/arrows': ['error', { root: at('packages/elements/src'), packages: ['@rillage/sdk', 'lit(/.*)?', 'uplot', 'idb-keyval'] }],
      'rillage/template-hazards': 'error',
      'no-restricted-syntax': ['error', ...elementSyntax],
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            { regex: '(unsafe-html|unsafe-svg|unsafe-mathml|style-map)', message: 'Refused by the policy that embedding pages set.' },
          ],
        },
      ],
    },
  },
  {
    files: ['test/**/*.{ts,mjs}'],
    rules: {
      'no-restricted-syntax': ['error', ...testSyntax],
      '@typescript-eslint/no-floating-promises': 'off',
      'no-control-regex': 'off',
    },
  },
);

function ban(selector, message) {
  return { selector, message };
}
