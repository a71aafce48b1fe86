import { betaI } from '../numeric/beta.js';
import { logGamma } from '../numeric/logGamma.js';
import { POSITIVE } from './amount.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** Ω = I_x(a, b) with x = S_T / S, the regularised incomplete beta function, over total storage (van der Velde et al. 2012). */
export const betaCurve: Curve = {
  name: 'beta',
  over: 'total',
  share: (x, a, b) => (x <= 0 ? 0 : x >= 1 ? 1 : betaI(x, a, b)),
  density(x, a, b) {
    if (x < 0 || x > 1) return 0;
    const log = (a - 1) * Math.log(x) + (b - 1) * Math.log1p(-x);
    return Math.exp(log + logGamma(a + b) - logGamma(a) - logGamma(b));
  },
  costly: true,
  cornered: false,
  centre: (a, b) => a / (a + b),
};

export const beta: FormDefinition = {
  form: 'beta',
  fields: ['a', 'b'],
  compile: (data, path, amounts, weights) => [
    piece(weights, {
      curve: betaCurve,
      p: amounts.add(data['a'], `${path}.a`, POSITIVE),
      q: amounts.add(data['b'], `${path}.b`, POSITIVE),
    }),
  ],
};
