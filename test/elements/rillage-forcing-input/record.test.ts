import { describe, expect, it } from 'vitest';
import { shownRecord } from '../../../packages/elements/src/rillage-forcing-input/record.js';
import { readForcing } from '../../../packages/sdk/src/forcing/readForcing.js';

const zone = 'UTC';
const read = readForcing(
  [
    'day,rain,flow\n2020-01-01,1,2\n2020-01-02,,2\n2020-01-03,3,\n2020-01-04,4,5\n',
    'from,to,cl\n2020-01-01,2020-01-02,7\n2020-01-04,2020-01-04,<9\n',
    'day,cl\n2020-01-01,3\n2020-01-01 18:00,4\n2020-01-04,5\n2021-01-01,6\n',
  ],
  {
    gaps: ['precipitation', 'discharge'].map((of) => ({ of, fill: 'linear', upToSteps: 1 })),
    rainConcentration: { uncovered: 'amountWeightedMean' },
    sources: [
      {
        time: { columns: [1], zone },
        columns: [
          { position: 2, holds: 'precipitation', unit: 'mm' },
          { position: 3, holds: 'outflow', unit: 'mm/d' },
        ],
      },
      {
        time: { columns: [2], from: [1], zone, lastDayIncluded: true },
        columns: [{ position: 3, holds: 'rainTracer', as: 'chloride', unit: 'mg/L' }],
      },
      { time: { columns: [1], zone }, columns: [{ position: 2, holds: 'streamTracer', as: 'chloride', unit: 'mg/L' }] },
    ],
  },
);

describe('shownRecord(read)', () => {
  const record = shownRecord(read);

  it('shows a filled step as a gap, and keeps its value for the table', () => {
    expect(record.line('precipitation')).toEqual([1, null, 3, 4]);
    expect(record.line('discharge')).toEqual([2, 2, null, 5]);
    expect([record.value('discharge', 2), record.filled('discharge')![2]]).toEqual([3.5, 1]);
  });

  it('shows rain samples over their intervals, and nothing where there is none', () => {
    expect(record.line('chloride')).toEqual([7, 7, null, 9]);
  });

  it('puts each bottle into its step, the last of several, none beyond the record', () => {
    expect([...record.bottles('chloride')].map(([step, { value }]) => [step, value])).toEqual([
      [0, 4],
      [3, 5],
    ]);
  });

  it('names what may be drawn', () => {
    const { rain, flow, others, tracers } = record;
    expect({ rain, flow, others, tracers }).toEqual({ rain: 'precipitation', flow: 'discharge', others: [], tracers: ['chloride'] });
    expect([record.unit('chloride'), record.unit('discharge'), record.unit('constructor')]).toEqual([' (mg/L)', ' (mm)', '']);
  });
});
