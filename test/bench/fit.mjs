import { fitCatchment, runColumn } from '@rillage/sdk';
import { syntheticForcing } from './forcing.mjs';

/** Ten daily years, 250 bottles of two tracers, five unknowns, on two workers: seconds until it converged, with R-hat and effective sizes. */
export async function benchFit() {
  const forcing = syntheticForcing({ years: 10 });
  const d18O = forcing.inflowConcentration.d18O;
  forcing.inflowConcentration = { d18O, d2H: d18O.map((delta, k) => 8 * delta + 10 + ((k * 37) % 11) / 5 - 1) };
  const settled = (shape, scale, evaporation) => ({
    initialStorage: 1500,
    selection: { discharge: { form: 'gamma', shape, scale }, evapotranspiration: { form: 'exponential', scale: evaporation } },
    tracers: { d18O: { preRecord: -9 }, d2H: { preRecord: -62 } },
  });
  const truth = runColumn(settled(0.6, 400, 60), forcing).outflows.discharge.concentration;
  const samples = [];
  let noise = 12345;
  const normal = () => {
    let sum = 0;
    for (let k = 0; k < 12; k++) sum += (noise = (noise * 16807) % 2147483647) / 2147483647;
    return sum - 6;
  };
  for (let k = 300; samples.length < 250; k += 26) {
    const at = new Date(Date.parse(forcing.start) + (k + 0.5) * 86400000).toISOString();
    samples.push({ tracer: 'd18O', from: at, to: at, value: truth.d18O[k] + 0.1 * normal(), unit: 'permil' });
    samples.push({ tracer: 'd2H', from: at, to: at, value: truth.d2H[k] + 0.8 * normal(), unit: 'permil' });
  }
  const log = (low, high) => ({ prior: 'logUniform', low, high });
  const problem = {
    forcing,
    catchment: settled({ prior: 'uniform', low: 0.2, high: 1.5 }, log(30, 3000), log(10, 500)),
    samples,
    errors: { d18O: { error: 'normal', constant: log(0.01, 1) }, d2H: { error: 'normal', constant: log(0.1, 8) } },
  };
  const before = performance.now();
  const fit = await fitCatchment(problem, { seed: 4, workers: 2 });
  const seconds = (performance.now() - before) / 1000;
  const worst = Math.max(...fit.parameters.map(({ rHat }) => rHat));
  const fewest = Math.min(...fit.parameters.flatMap(({ bulkSize, tailSize }) => [bulkSize, tailSize]));
  const scale = fit.parameters.find(({ path }) => path.includes('discharge.scale')).after;
  return [
    {
      what: 'ten years, 250 samples, five unknowns, two workers',
      measured: `${seconds.toFixed(0)} s of wall time`,
      target: '≤ 120 s, aim 20 s',
      holds: seconds <= 120,
    },
    { what: 'runs until converged', measured: String(fit.evaluations), target: '', holds: fit.converged },
    {
      what: 'R-hat, worst; effective size, least',
      measured: `${worst.toFixed(3)}; ${fewest.toFixed(0)}`,
      target: '≤ 1.01; ≥ 400',
      holds: worst <= 1.01 && fewest >= 400,
    },
    {
      what: 'scale of discharge, 5 to 95 % (truth 400)',
      measured: `${scale[0].toFixed(0)} to ${scale[2].toFixed(0)}`,
      target: 'holds 400',
      holds: scale[0] < 400 && scale[2] > 400,
    },
  ];
}
