import { DEPTH } from './amount.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** Ω = S_T / S: every mm of storage is equally likely to leave (van der Velde et al. 2012; Rinaldo et al. 2015). */
export const overTotal: Curve = {
  name: 'uniform',
  over: 'total',
  share: (x) => (x <= 0 ? 0 : x < 1 ? x : 1),
  density: (x) => (x >= 0 && x <= 1 ? 1 : 0),
  costly: false,
  cornered: false,
  centre: () => 0.5,
};

/** Ω = min(S_T / depth, 1): every mm of the youngest `depth` mm is equally likely to leave, nothing below. */
export const overDepth: Curve = {
  ...overTotal,
  name: 'uniform-depth',
  over: 'depth',
  cornered: true,
};

export const uniform: FormDefinition = {
  form: 'uniform',
  fields: ['depth'],
  compile(data, path, amounts, weights) {
    if (data['depth'] === undefined) return [piece(weights, { curve: overTotal })];
    return [piece(weights, { curve: overDepth, scale: amounts.add(data['depth'], `${path}.depth`, DEPTH) })];
  },
};
