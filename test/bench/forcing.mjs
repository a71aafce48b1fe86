/**
 * A seeded synthetic record for benchmarks: wet spells of a two-state chain with exponential amounts, seasonal evapotranspiration, and
 * discharge from one linear store, so that the balance closes. Nothing of it is data.
 */
export function syntheticForcing({ years = 20, stepDays = 1, seed = 7 } = {}) {
  const steps = Math.round((years * 365.25) / stepDays);
  const random = generator(seed);
  const inflow = new Float64Array(steps);
  const discharge = new Float64Array(steps);
  const evapotranspiration = new Float64Array(steps);
  const concentration = new Float64Array(steps);
  let wet = false;
  let active = 120; // mm above the level at which flow stops
  for (let k = 0; k < steps; k++) {
    const season = (2 * Math.PI * k * stepDays) / 365.25;
    const stay = stepDays >= 1 ? [0.32, 0.62] : [0.32 * stepDays * 1.5, 1 - (1 - 0.62) * stepDays * 1.5];
    wet = random() < (wet ? stay[1] : stay[0]);
    inflow[k] = wet ? -Math.log(1 - random()) * 6.5 * (1 + 0.2 * Math.cos(season)) : 0;
    if (wet && random() < 0.02) inflow[k] *= 4;
    evapotranspiration[k] = Math.max(0.05, 1.4 - 1.3 * Math.cos(season)) * (active > 20 ? 1 : active / 20);
    const flow = 0.012 * active + (active > 140 ? 0.06 * (active - 140) : 0);
    discharge[k] = Math.max(0.01, flow);
    active = Math.max(1, active + (inflow[k] - evapotranspiration[k] - discharge[k]) * stepDays);
    concentration[k] = -9 - 3 * Math.cos(season) + 2.5 * (random() - 0.5);
  }
  return {
    start: '2000-01-01T00:00:00Z',
    stepDays,
    inflow,
    outflows: { discharge, evapotranspiration },
    inflowConcentration: { d18O: concentration },
  };
}

/** Park & Miller's minimal standard generator (ISO C++ minstd_rand0): enough for synthetic rain. */
function generator(seed) {
  let state = seed % 2147483647 || 1;
  return () => (state = (state * 16807) % 2147483647) / 2147483647;
}

export const benchCatchment = {
  initialStorage: 1500,
  selection: { discharge: { form: 'gamma', shape: 0.6, scale: 400 }, evapotranspiration: { form: 'exponential', scale: 60 } },
  tracers: { d18O: { preRecord: -9 } },
};

export const benchOptions = { youngerThan: [7, 30, 90, 365], quantiles: [0.5] };
