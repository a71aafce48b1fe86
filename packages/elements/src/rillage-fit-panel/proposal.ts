import type { Catchment, FitProblem, Forcing, Prior, Sample, WithPriors } from '@rillage/sdk';

/** What a fit is of: as `readForcing` gives it. */
export interface FitRecord {
  forcing: Forcing;
  samples: readonly Sample[];
  rainSamples?: readonly Sample[];
}

/** What is chosen about a fit: a problem without its record. */
export type FitChoices = Omit<FitProblem, 'forcing' | 'samples' | 'rainSamples'>;
export type OpenCatchment = WithPriors<Catchment>;

const logUniform = (low: number, high: number): Prior => ({ prior: 'logUniform', low, high });
const twoDigits = (value: number): number => Number(value.toPrecision(2));
/** Of scales in mm: a few storms to more than most storages that a stream draws on. Common practice. */
const scale = (): Prior => logUniform(20, 4000);
const shape = (): Prior => ({ prior: 'uniform', low: 0.2, high: 1.5 });

/** Ways in which an outflow may draw on ages, to be tried against each other; `anomaly` is the usual span of storage about its start, mm. */
const forms: Record<string, (anomaly: [number, number]) => OpenCatchment['selection'][string]> = {
  gammaWithStorage: (at) => ({ form: 'gamma', shape: shape(), scale: { driver: 'storageAnomaly', at, value: [scale(), scale()] } }),
  gammaSteady: () => ({ form: 'gamma', shape: shape(), scale: scale() }),
  exponentialSteady: () => ({ form: 'exponential', scale: scale() }),
  beta: () => ({ form: 'beta', a: logUniform(0.1, 2), b: logUniform(0.5, 10) }),
  uniform: () => ({ form: 'uniform' }),
};
export const formNames = Object.keys(forms);

/** Tracers that can be fitted: measured in an outflow, and known in the rain. */
export function tracersOf({ forcing, samples }: FitRecord): string[] {
  const known = (tracer: string): boolean => Object.hasOwn(forcing.inflowConcentration, tracer);
  return [...new Set(samples.map(({ tracer }) => tracer))].filter(known);
}

/** A catchment whose numbers are open where the samples may tell, with `form` for the stream. */
export function proposeCatchment(record: FitRecord, form: string, tracers: readonly string[]): OpenCatchment {
  const anomaly = storageAnomaly(record.forcing);
  const selection = Object.fromEntries(
    Object.keys(record.forcing.outflows).map((outflow, index) => [
      outflow,
      outflow === 'discharge' || (index === 0 && !('discharge' in record.forcing.outflows))
        ? forms[form]!(anomaly.usual)
        : { form: 'exponential', scale: logUniform(20, 500) },
    ]),
  ) as OpenCatchment['selection'];
  const least = Math.max(500, twoDigits(2 * anomaly.drawdown));
  return {
    initialStorage: logUniform(least, 10 * least),
    selection,
    tracers: Object.fromEntries(tracers.map((tracer) => [tracer, proposeRule(record, tracer)])),
  };
}

/** What to begin with: a selection that follows storage against a steady one, every tracer, every filling of the days between bulk samples. */
export function proposeChoices(record: FitRecord): FitChoices {
  const tracers = tracersOf(record);
  return {
    catchment: proposeCatchment(record, 'gammaWithStorage', tracers),
    otherCatchments: { gammaSteady: proposeCatchment(record, 'gammaSteady', tracers) },
    errors: Object.fromEntries(tracers.map((tracer) => [tracer, proposeError(record, tracer)])),
    ...(record.rainSamples?.length ? { fillings: [{ rule: 'seasonalPlusResidual', uncovered: 'amountWeightedMean' }] } : {}),
  };
}

/** Isotopes leave with every water; what is dissolved stays behind when water evaporates (common practice). */
function proposeRule(record: FitRecord, tracer: string): NonNullable<OpenCatchment['tracers']>[string] {
  const { mean, sd, unit } = valuesOf(record, tracer);
  const isotope = unit === 'permil' || unit === '‰';
  return {
    preRecord: { prior: 'normal', mean: Number(mean.toPrecision(3)), sd: twoDigits(sd) },
    ...(isotope || !('evapotranspiration' in record.forcing.outflows) ? {} : { carriedShare: { evapotranspiration: 0 } }),
  };
}

export function proposeError(record: FitRecord, tracer: string): FitChoices['errors'][string] {
  const { sd } = valuesOf(record, tracer);
  return { error: 'normal', constant: logUniform(twoDigits(0.02 * sd), twoDigits(2 * sd)) };
}

function valuesOf({ samples }: FitRecord, tracer: string): { mean: number; sd: number; unit: string } {
  const own = samples.filter((sample) => sample.tracer === tracer);
  const mean = own.reduce((sum, { value }) => sum + value, 0) / Math.max(1, own.length);
  const variance = own.reduce((sum, { value }) => sum + (value - mean) ** 2, 0) / Math.max(1, own.length);
  return { mean, sd: Math.sqrt(variance) || 0.01 * Math.abs(mean) || 1, unit: own[0]?.unit ?? '' };
}

/** Storage less its start through the record: where it usually lies, and how far it falls below its start; mm. */
function storageAnomaly({ inflow, outflows, stepDays }: Forcing): { usual: [number, number]; drawdown: number } {
  const series = Object.values(outflows);
  let storage = 0;
  const path = Array.from(inflow, (rain, k) => (storage += (rain - series.reduce((sum, flux) => sum + flux[k]!, 0)) * stepDays));
  path.sort((a, b) => a - b);
  const quantile = (p: number): number => Math.round(path[Math.round(p * (path.length - 1))] ?? 0);
  const low = quantile(0.05);
  return { usual: [low, Math.max(quantile(0.95), low + 1)], drawdown: Math.max(0, -(path[0] ?? 0)) };
}
