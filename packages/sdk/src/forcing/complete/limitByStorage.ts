import { RillageError } from '../../errors.js';

export interface RootZone {
  /** mm of water between full and empty. */
  capacity: number;
  /** Share of the capacity that may be gone before plants feel it; common practice 0.5. */
  stressBegins: number;
  /** mm missing at the start. */
  initialDepletion: number;
}

/**
 * Evapotranspiration that the water in the root zone allows: ET = K_s ET_0, K_s = (1 − d) / (1 − p) where the depletion d = D / capacity exceeds p, else 1.
 * The depletion shrinks by the step's water and grows by ET; what overfills the zone drains below.
 * @param potential [N] mm/day
 * @param inflow    [N] mm/day
 * @param stepDays  days
 * @returns actual [N] mm/day, and the depletion [N] mm at the end of each step; never above `capacity`
 * @throws RillageError 'length-mismatch' | 'root-zone-invalid'
 * @source Allen et al. 1998 (FAO-56), eq. 84 and 85 (from memory); K_s is taken after the step's inflow, before its evapotranspiration
 */
export function limitByStorage(
  potential: Float64Array,
  inflow: Float64Array,
  stepDays: number,
  zone: RootZone,
): { actual: Float64Array; depletion: Float64Array } {
  if (potential.length !== inflow.length) {
    throw new RillageError({
      code: 'length-mismatch',
      path: 'inflow',
      expected: `${potential.length} values`,
      received: String(inflow.length),
    });
  }
  const { capacity, stressBegins, initialDepletion } = zone;
  if (!(capacity > 0 && stressBegins >= 0 && stressBegins < 1 && initialDepletion >= 0 && initialDepletion <= capacity)) {
    throw new RillageError({
      code: 'root-zone-invalid',
      path: 'evapotranspiration.limit',
      expected: 'capacity above 0, stressBegins in [0, 1), initialDepletion from 0 to capacity',
      received: JSON.stringify(zone),
    });
  }
  const actual = new Float64Array(potential.length);
  const depletion = new Float64Array(potential.length);
  let missing = initialDepletion;
  for (let step = 0; step < potential.length; step++) {
    missing = Math.max(0, missing - inflow[step] * stepDays);
    const gone = missing / capacity;
    const stress = gone <= stressBegins ? 1 : (1 - gone) / (1 - stressBegins);
    const taken = Math.min(stress * potential[step] * stepDays, capacity - missing);
    actual[step] = taken / stepDays;
    missing += taken;
    depletion[step] = missing;
  }
  return { actual, depletion };
}
