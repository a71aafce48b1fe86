import { POSITIVE } from './amount.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** Ω = 1 − (1 − x^a)^b with x = S_T / S, over total storage (Kumaraswamy 1980, J. Hydrol. 46, 79). */
export const kumaraswamyCurve: Curve = {
  name: 'kumaraswamy',
  over: 'total',
  share: (x, a, b) => (x <= 0 ? 0 : x >= 1 ? 1 : -Math.expm1(b * Math.log1p(-(x ** a)))),
  density: (x, a, b) => (x < 0 || x > 1 ? 0 : a * b * x ** (a - 1) * (1 - x ** a) ** (b - 1)),
  costly: true,
  cornered: false,
  centre: (a, b) => (1 - 2 ** (-1 / b)) ** (1 / a),
};

export const kumaraswamy: FormDefinition = {
  form: 'kumaraswamy',
  fields: ['a', 'b'],
  compile: (data, path, amounts, weights) => [
    piece(weights, {
      curve: kumaraswamyCurve,
      p: amounts.add(data['a'], `${path}.a`, POSITIVE),
      q: amounts.add(data['b'], `${path}.b`, POSITIVE),
    }),
  ],
};
