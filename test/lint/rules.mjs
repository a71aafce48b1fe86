/** The project's own lint rules. Each is tested in test/lint/rules.test.ts. */
import { arrows } from './arrows.mjs';
import { templateHazards } from './template-hazards.mjs';

export const rillageRules = { rules: { arrows, 'template-hazards': templateHazards } };
