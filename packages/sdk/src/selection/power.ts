import { POSITIVE } from './amount.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** Ω = x^exponent with x = S_T / S, over total storage; an exponent below 1 prefers young water (Benettin et al. 2017, Water Resour. Res. 53). */
export const powerCurve: Curve = {
  name: 'power',
  over: 'total',
  share: (x, exponent) => (x <= 0 ? 0 : x >= 1 ? 1 : x ** exponent),
  density: (x, exponent) => (x < 0 || x > 1 ? 0 : exponent * x ** (exponent - 1)),
  costly: false,
  cornered: false,
  centre: () => 0.5,
};

export const power: FormDefinition = {
  form: 'power',
  fields: ['exponent'],
  compile: (data, path, amounts, weights) => [
    piece(weights, { curve: powerCurve, p: amounts.add(data['exponent'], `${path}.exponent`, POSITIVE) }),
  ],
};
