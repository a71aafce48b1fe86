import { trackAges } from './ages.mjs';

/**
 * The tracking loop at `subSteps` and at half of it, extrapolated to step zero (2 × fine − coarse takes out the error of first order).
 * `differ` says by how much the two differ at most: an upper bound on what is left.
 */
export function refineAges(station, water, { subSteps = station.subSteps } = {}) {
  const fine = trackAges(station, water, { subSteps });
  const coarse = trackAges(station, water, { subSteps: subSteps / 2 });
  const differ = {};
  const extrapolate = (name, a, b) => {
    differ[name] = 0;
    return a.map((value, i) => {
      if (value === null || b[i] === null) return null;
      differ[name] = Math.max(differ[name], Math.abs(value - b[i]));
      return 2 * value - b[i];
    });
  };
  const each = (kind) =>
    Object.fromEntries(Object.keys(fine[kind]).map((key) => [key, extrapolate(`${kind}.${key}`, fine[kind][key], coarse[kind][key])]));
  return {
    ...fine,
    younger: each('younger'),
    concentration: each('concentration'),
    medianDays: extrapolate('medianDays', fine.medianDays, coarse.medianDays),
    preRecordShare: extrapolate('preRecordShare', fine.preRecordShare, coarse.preRecordShare),
    differ,
  };
}
