import { gammaP } from '../numeric/gamma.js';
import { logGamma } from '../numeric/logGamma.js';
import { DEPTH, NOT_NEGATIVE, POSITIVE } from './amount.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** ln Γ of the shape last asked for: tables ask for thousands of densities of one shape. */
const known = { shape: NaN, log: 0 };

/** Ω = P(shape, (S_T − from) / scale), the regularised lower incomplete gamma function, over unbounded storage (Harman 2015). */
export const gammaCurve: Curve = {
  name: 'gamma',
  over: 'depth',
  share: (x, shape) => (x <= 0 ? 0 : gammaP(shape, x)),
  density(x, shape) {
    if (x < 0) return 0;
    if (x === 0) return shape < 1 ? Infinity : shape === 1 ? 1 : 0;
    if (shape !== known.shape) {
      known.shape = shape;
      known.log = logGamma(shape);
    }
    return Math.exp((shape - 1) * Math.log(x) - x - known.log);
  },
  costly: true,
  cornered: false,
  centre: (shape) => Math.max(shape, 0.1),
};

/** The same with a start below the surface: its own singularity lies inside the column, so steps across it are taken with care. */
export const gammaFromCurve: Curve = { ...gammaCurve, name: 'gamma-from', cornered: true };

export const gamma: FormDefinition = {
  form: 'gamma',
  fields: ['shape', 'scale', 'from'],
  compile(data, path, amounts, weights) {
    const p = amounts.add(data['shape'], `${path}.shape`, POSITIVE);
    const scale = amounts.add(data['scale'], `${path}.scale`, DEPTH);
    if (data['from'] === undefined || data['from'] === 0) return [piece(weights, { curve: gammaCurve, scale, p })];
    return [piece(weights, { curve: gammaFromCurve, scale, p, from: amounts.add(data['from'], `${path}.from`, NOT_NEGATIVE) })];
  },
};
