/**
 * Markup in a Lit template that a strict content security policy refuses: a `style` attribute, an inline handler, a script or style
 * element. A property binding (`.style=`), an event binding (`@click=`) and a boolean binding (`?hidden=`) are no hazards.
 */
export const templateHazards = {
  meta: {
    type: 'problem',
    schema: [],
    messages: { hazard: '`{{found}}` in a template is refused by the policy that embedding pages set; {{instead}}.' },
  },
  create(context) {
    return {
      TaggedTemplateExpression(node) {
        const tag = node.tag.type === 'Identifier' ? node.tag.name : '';
        if (tag !== 'html' && tag !== 'svg') return;
        for (const quasi of node.quasi.quasis) {
          for (const { pattern, instead } of hazards) {
            const found = pattern.exec(quasi.value.raw)?.[0].trim();
            if (found) context.report({ node: quasi, messageId: 'hazard', data: { found, instead } });
          }
        }
      },
    };
  },
};

const hazards = [
  { pattern: /(?:^|\s)style\s*=/i, instead: 'use a class, or set the property from script' },
  { pattern: /(?:^|\s)on[a-z]+\s*=/i, instead: 'bind with @event' },
  { pattern: /<script\b/i, instead: 'put code in a module' },
  { pattern: /<style\b/i, instead: 'use static styles' },
];
