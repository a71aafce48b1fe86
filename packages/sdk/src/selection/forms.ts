import { shorten, type Issue } from '../errors.js';
import { SHARE, type AmountTable } from './amount.js';
import { beta } from './beta.js';
import type { Piece } from './curve.js';
import { exponential } from './exponential.js';
import type { FormDefinition } from './form.js';
import { gamma } from './gamma.js';
import { kumaraswamy } from './kumaraswamy.js';
import { oldestFirst, youngestFirst } from './limits.js';
import { piecewise } from './piecewise.js';
import { power } from './power.js';
import { uniform } from './uniform.js';

const DEEPEST_MIXTURE = 4;
const MOST_PARTS = 12;

/** Ω = Σ weight · Ω_part, weights that add up to 1 at every step. Parts may be mixtures themselves. */
const mixture: FormDefinition = {
  form: 'mixture',
  fields: ['parts'],
  compile(data, path, amounts, weights) {
    const parts = data['parts'];
    if (!Array.isArray(parts) || parts.length === 0 || parts.length > MOST_PARTS) {
      amounts.issues.push({
        code: 'mixture-parts',
        path: `${path}.parts`,
        expected: `1 to ${MOST_PARTS} parts`,
        received: Array.isArray(parts) ? `${parts.length} parts` : shorten(parts ?? 'nothing'),
      });
      return [];
    }
    if (path.split('.parts[').length > DEEPEST_MIXTURE) {
      amounts.issues.push({ code: 'mixture-parts', path, expected: `mixtures at most ${DEEPEST_MIXTURE} deep`, received: 'a deeper one' });
      return [];
    }
    return parts.flatMap((part: unknown, index) => {
      const at = `${path}.parts[${index}]`;
      const entry = (typeof part === 'object' && part !== null ? part : {}) as Record<string, unknown>;
      const unknown = Object.keys(entry).filter((key) => key !== 'weight' && key !== 'selection');
      for (const key of unknown)
        amounts.issues.push({ code: 'unknown-field', path: `${at}.${key}`, expected: 'weight and selection only', received: shorten(key) });
      const weight = amounts.add(entry['weight'], `${at}.weight`, SHARE);
      return compileForm(entry['selection'], `${at}.selection`, amounts, [...weights, weight]);
    });
  },
};

const FORMS: ReadonlyMap<string, FormDefinition> = new Map(
  [uniform, exponential, gamma, beta, kumaraswamy, power, piecewise, youngestFirst, oldestFirst, mixture].map((form) => [form.form, form]),
);

/** Every form's name, in the order they are documented. */
export const FORM_NAMES: readonly string[] = [...FORMS.keys()];

/** Compiles plain data to pieces; what is wrong with it goes to `amounts.issues`. */
export function compileForm(data: unknown, path: string, amounts: AmountTable, weights: readonly number[]): Piece[] {
  const record = (typeof data === 'object' && data !== null ? data : {}) as Record<string, unknown>;
  const form = FORMS.get(String(record['form']));
  if (form === undefined) {
    const issue: Issue = {
      code: 'selection-form',
      path: `${path}.form`,
      expected: `one of ${FORM_NAMES.join(', ')}`,
      received: shorten(record['form'] ?? data ?? 'nothing'),
    };
    amounts.issues.push(issue);
    return [];
  }
  for (const key of Object.keys(record)) {
    if (key !== 'form' && !form.fields.includes(key)) {
      amounts.issues.push({
        code: 'unknown-field',
        path: `${path}.${key}`,
        expected: form.fields.length > 0 ? `for ${form.form}: ${form.fields.join(', ')}` : `no parameters for ${form.form}`,
        received: shorten(key),
      });
    }
  }
  return form.compile(record, path, amounts, weights);
}
