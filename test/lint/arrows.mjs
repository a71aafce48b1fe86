import { dirname, relative, resolve, sep } from 'node:path';

/**
 * Keeps the arrows between rooms pointing one way. Options: `root`, the absolute folder that holds the rooms; `rooms`, a table from a
 * room's name to the rooms and loose files it may import; `packages`, patterns of the packages that any file under `root` may import.
 * A loose file directly under `root` is a room of its own name without extension. A room absent from the table may import anything.
 */
export const arrows = {
  meta: {
    type: 'problem',
    schema: [
      {
        type: 'object',
        additionalProperties: false,
        required: ['root'],
        properties: {
          root: { type: 'string' },
          rooms: { type: 'object', additionalProperties: { type: 'array', items: { type: 'string' } } },
          packages: { type: 'array', items: { type: 'string' } },
        },
      },
    ],
    messages: {
      room: "'{{from}}' may not import '{{to}}'; it may import {{allowed}}. The arrows are listed in eslint.config.mjs.",
      package: "'{{specifier}}' may not be imported here; packages allowed: {{allowed}}.",
      outside: "'{{specifier}}' leaves the package; import its public entry instead.",
      extension: "'{{specifier}}' must end in .js, as browsers and Deno resolve it.",
    },
  },
  create(context) {
    const { root, rooms = {}, packages = [] } = context.options[0];
    const from = roomOf(root, context.filename);
    if (from === undefined) return {};
    const patterns = packages.map((pattern) => new RegExp(`^(?:${pattern})$`));

    const check = (source) => {
      if (source?.type !== 'Literal' || typeof source.value !== 'string') return;
      const specifier = source.value;
      const report = (messageId, data = {}) => context.report({ node: source, messageId, data: { specifier, from, ...data } });
      if (!specifier.startsWith('.')) {
        if (!patterns.some((pattern) => pattern.test(specifier))) report('package', { allowed: packages.join(', ') || 'none' });
        return;
      }
      const to = roomOf(root, resolve(dirname(context.filename), specifier));
      if (to === undefined) return report('outside');
      if (!/\.(?:js|json|css)$/.test(specifier)) report('extension');
      const allowed = rooms[from];
      if (allowed !== undefined && to !== from && !allowed.includes(to))
        report('room', { to, allowed: allowed.join(', ') || 'nothing of ours' });
    };

    return {
      ImportDeclaration: (node) => check(node.source),
      ExportNamedDeclaration: (node) => check(node.source),
      ExportAllDeclaration: (node) => check(node.source),
      ImportExpression: (node) => check(node.source),
      TSImportType: (node) => check(node.source ?? node.argument?.literal),
    };
  },
};

function roomOf(root, path) {
  const inside = relative(root, path);
  if (inside === '' || inside.startsWith('..')) return undefined;
  return inside.split(sep)[0].replace(/\.[a-z.]+$/, '');
}
