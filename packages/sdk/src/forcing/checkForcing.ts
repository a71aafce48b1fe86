import type { Catchment, Finding, Forcing } from '../contract.js';
import { waterBalance } from './complete/waterBalance.js';

/** mm a year outside which an inflow is hardly one (common practice: deserts and the wettest places on land). */
const INFLOW_BOUNDS = { low: 100, high: 8000 };
/** Share of the inflow that leaves as discharge, outside which a unit is suspected (common practice). */
const RUNOFF_BOUNDS = { low: 0.02, high: 1.2 };
/** Shortest record, days, for which a year's total is extrapolated. */
const SHORTEST_DAYS = 180;

/**
 * What a forcing looks like as a record of a catchment: values that cannot be, the balance and what would close it, totals by year, the runoff
 * ratio, units that are probably wrong, and, with a catchment, storage that would run out. Changes nothing.
 */
export function checkForcing(forcing: Forcing, catchment?: Catchment): Finding[] {
  const impossible = impossibleValues(forcing);
  if (impossible.length > 0) return impossible;
  return [
    ...balance(forcing),
    ...annualTotals(forcing),
    ...unitAlarms(forcing),
    ...missingConcentration(forcing),
    ...(catchment ? storageRunsOut(forcing, catchment) : []),
  ];
}

function impossibleValues({ inflow, outflows, drivers }: Forcing): Finding[] {
  const findings: Finding[] = [];
  const look = (where: string, series: Float64Array, isFlux: boolean): void => {
    let count = series.length === inflow.length ? 0 : -1;
    let first = -1;
    for (let step = 0; step < series.length && count >= 0; step++) {
      if (Number.isFinite(series[step]) && (!isFlux || series[step] >= 0)) continue;
      count += 1;
      if (first < 0) first = step;
    }
    if (count < 0)
      findings.push({
        code: 'length-mismatch',
        severity: 'stop',
        where,
        seen: `${series.length} values beside ${inflow.length} of the inflow`,
        done: 'nothing',
      });
    if (count > 0) {
      findings.push({
        code: isFlux ? 'impossible-flux' : 'not-finite',
        severity: 'stop',
        where: `${where}[${first}]`,
        count,
        seen: `${count} values that are ${isFlux ? 'negative or ' : ''}not finite`,
        done: 'nothing',
        settle: 'A gap is filled by a named rule in the layout; a negative flux is an error of the record.',
      });
    }
  };
  look('inflow', inflow, true);
  for (const [name, series] of Object.entries(outflows)) look(`outflows.${name}`, series, true);
  for (const [name, series] of Object.entries(drivers ?? {})) look(`drivers.${name}`, series, false);
  return findings;
}

function balance(forcing: Forcing): Finding[] {
  const all = waterBalance(forcing);
  const share = all.inflow > 0 ? all.change / all.inflow : 0;
  const outflows = Object.entries(all.outflows).map(([name, depth]) => `${name} ${mm(depth)}`);
  const factors = Object.entries(all.closedBy.outflowFactor).map(([name, factor]) =>
    factor === null ? null : `${name} times ${factor.toFixed(3)}`,
  );
  const closing = [all.closedBy.inflowFactor === null ? null : `inflow times ${all.closedBy.inflowFactor.toFixed(3)}`, ...factors].filter(
    (text) => text !== null,
  );
  return [
    {
      code: 'balance',
      severity: Math.abs(share) > 0.1 ? 'warning' : 'note',
      where: 'forcing',
      seen: `inflow ${mm(all.inflow)}, ${outflows.join(', ') || 'no outflow'}; storage ${all.change < 0 ? 'loses' : 'gains'} ${mm(Math.abs(all.change))} in ${all.years.toFixed(2)} years (${(100 * share).toFixed(1)} % of the inflow)`,
      done: 'nothing is scaled',
      ...(closing.length > 0 ? { settle: `It would close with ${closing.join(', or ')}.` } : {}),
    },
  ];
}

function annualTotals({ start, stepDays, inflow }: Forcing): Finding[] {
  const startMs = Date.parse(start);
  if (!Number.isFinite(startMs)) return [];
  const years = new Map<number, { depth: number; days: number }>();
  for (let step = 0; step < inflow.length; step++) {
    const year = new Date(startMs + (step + 0.5) * stepDays * 86_400_000).getUTCFullYear();
    const sum = years.get(year) ?? { depth: 0, days: 0 };
    sum.depth += inflow[step] * stepDays;
    sum.days += stepDays;
    years.set(year, sum);
  }
  const whole = [...years].filter(([, { days }]) => days > 364);
  if (whole.length === 0) return [];
  const sorted = whole.map(([, { depth }]) => depth).sort((a, b) => a - b);
  const middle = sorted[Math.floor(sorted.length / 2)];
  const odd = whole.filter(([, { depth }]) => whole.length > 2 && (depth < middle / 4 || depth > middle * 4));
  const findings: Finding[] = [
    {
      code: 'annual-totals',
      severity: 'note',
      where: 'inflow',
      seen: whole.map(([year, { depth }]) => `${year}: ${mm(depth)}`).join(', '),
      done: 'nothing',
    },
  ];
  if (odd.length > 0) {
    findings.push({
      code: 'year-unlike-others',
      severity: 'warning',
      where: 'inflow',
      count: odd.length,
      seen: `${odd.map(([year, { depth }]) => `${year} with ${mm(depth)}`).join(', ')} beside a middle year of ${mm(middle)}`,
      done: 'nothing',
      settle: 'Did the unit or the instrument change in that year?',
    });
  }
  return findings;
}

function unitAlarms(forcing: Forcing): Finding[] {
  const { inflow, outflows, years, days } = waterBalance(forcing);
  if (days < SHORTEST_DAYS) return [];
  const findings: Finding[] = [];
  const yearly = inflow / years;
  const alarm = (code: string, where: string, seen: string, settle: string): void =>
    void findings.push({ code, severity: 'warning', where, seen, done: 'nothing', settle });
  if (yearly < INFLOW_BOUNDS.low) {
    const inches = yearly * 25.4;
    const asInches = inches > 200 && inches < 4000 ? ` Read as inches it would be ${mm(inches)} a year.` : '';
    alarm('inflow-unit', 'inflow', `${mm(yearly)} a year, less than most deserts receive`, `Check the unit of precipitation.${asInches}`);
  } else if (yearly > INFLOW_BOUNDS.high) {
    const metric = yearly / 25.4;
    const asMillimetres = metric > 100 && metric < 4000 ? ` If the values are mm and not inches it is ${mm(metric)} a year.` : '';
    alarm(
      'inflow-unit',
      'inflow',
      `${mm(yearly)} a year, more than the wettest places on land receive`,
      `Check the unit of precipitation, and whether it is a running total.${asMillimetres}`,
    );
  }
  const discharge = outflows['discharge'];
  if (discharge === undefined || inflow <= 0) return findings;
  const ratio = discharge / inflow;
  if (ratio > RUNOFF_BOUNDS.high || ratio < RUNOFF_BOUNDS.low) {
    const likely = [
      { factor: 1000, text: 'L/s given as m3/s' },
      { factor: 35.3147, text: 'ft3/s given as m3/s' },
      { factor: 2.58999, text: 'an area in square miles given as km2' },
      { factor: 1 / 35.3147, text: 'm3/s given as ft3/s' },
      { factor: 1 / 1000, text: 'm3/s given as L/s' },
    ].filter(({ factor }) => ratio / factor > 0.1 && ratio / factor < 0.9);
    alarm(
      'runoff-ratio',
      'outflows.discharge',
      `${ratio.toPrecision(3)} of the inflow leaves as discharge`,
      `Check the unit of flow and the catchment area.${likely.length > 0 ? ` It would be ordinary after ${likely.map(({ text }) => text).join(', or ')}.` : ''}`,
    );
  }
  return findings;
}

function missingConcentration({ inflow, inflowConcentration }: Forcing): Finding[] {
  return Object.entries(inflowConcentration).flatMap(([name, series]): Finding[] => {
    const missing: number[] = [];
    for (let step = 0; step < inflow.length; step++) if (inflow[step] > 0 && !Number.isFinite(series[step])) missing.push(step);
    if (missing.length === 0) return [];
    return [
      {
        code: 'concentration-missing',
        severity: 'stop',
        where: `inflowConcentration.${name}[${missing[0]}]`,
        count: missing.length,
        seen: `${missing.length} steps with inflow and no concentration`,
        done: 'nothing',
        settle: 'Fill it from bulk samples, see rainConcentration in the layout.',
      },
    ];
  });
}

function storageRunsOut(forcing: Forcing, { initialStorage }: Catchment): Finding[] {
  const { deepestFall, deepestStep } = waterBalance(forcing);
  if (deepestFall < initialStorage) return [];
  return [
    {
      code: 'storage-runs-out',
      severity: 'stop',
      where: `storage[${deepestStep}]`,
      seen: `storage falls ${mm(deepestFall)} below its start, which is ${mm(initialStorage)}, by step ${deepestStep}`,
      done: 'nothing',
      settle: `Start with more than ${mm(Math.ceil(deepestFall))}, or close the balance first.`,
    },
  ];
}

function mm(depth: number): string {
  return `${Math.abs(depth) < 10 ? depth.toFixed(1) : Math.round(depth)} mm`;
}
