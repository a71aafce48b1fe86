import type { Forcing } from '../../contract.js';

export interface WaterBalance {
  /** Length of the record, days and years of 365.25 days. */
  days: number;
  years: number;
  /** mm over the record. */
  inflow: number;
  outflows: Record<string, number>;
  /** mm gained by storage: inflow − all outflows. */
  change: number;
  /** mm: how far storage falls below its start at the lowest, and the step at whose end it does; 0 and −1 where it never falls below. */
  deepestFall: number;
  deepestStep: number;
  /** What would close the balance over the record; nothing is applied. null where no factor could. */
  closedBy: {
    /** Factor on the inflow. */
    inflowFactor: number | null;
    /** By outflow: factor on it alone. */
    outflowFactor: Record<string, number | null>;
  };
}

/**
 * Water in, out and left over the record: ΔS = Σ (J − Σ Q_i) Δt.
 * @returns sums in mm; see {@link WaterBalance}
 * @source conservation of volume
 */
export function waterBalance(forcing: Forcing): WaterBalance {
  const { inflow, outflows, stepDays } = forcing;
  const names = Object.keys(outflows);
  let total = 0;
  let deepestFall = 0;
  let deepestStep = -1;
  for (let step = 0; step < inflow.length; step++) {
    let net = inflow[step];
    for (const name of names) net -= outflows[name][step];
    total += net * stepDays;
    if (-total > deepestFall) {
      deepestFall = -total;
      deepestStep = step;
    }
  }
  const sum = (series: Float64Array): number => series.reduce((all, value) => all + value, 0) * stepDays;
  const taken = Object.fromEntries(names.map((name) => [name, sum(outflows[name])]));
  const received = sum(inflow);
  const allTaken = Object.values(taken).reduce((all, value) => all + value, 0);
  return {
    days: inflow.length * stepDays,
    years: (inflow.length * stepDays) / 365.25,
    inflow: received,
    outflows: taken,
    change: received - allTaken,
    deepestFall,
    deepestStep,
    closedBy: {
      inflowFactor: received > 0 ? allTaken / received : null,
      outflowFactor: Object.fromEntries(
        names.map((name) => {
          const factor = (received - (allTaken - taken[name])) / taken[name];
          return [name, taken[name] > 0 && factor >= 0 ? factor : null];
        }),
      ),
    },
  };
}
