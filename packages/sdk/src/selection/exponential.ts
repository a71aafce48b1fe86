import { DEPTH } from './amount.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** Ω = 1 − exp(−S_T / scale), over unbounded storage. */
export const exponentialCurve: Curve = {
  name: 'exponential',
  over: 'depth',
  share: (x) => (x <= 0 ? 0 : -Math.expm1(-x)),
  density: (x) => (x < 0 ? 0 : Math.exp(-x)),
  costly: false,
  cornered: false,
  centre: () => 1,
};

export const exponential: FormDefinition = {
  form: 'exponential',
  fields: ['scale'],
  compile: (data, path, amounts, weights) => [
    piece(weights, { curve: exponentialCurve, scale: amounts.add(data['scale'], `${path}.scale`, DEPTH) }),
  ],
};
