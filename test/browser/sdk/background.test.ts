import { expect } from 'chai';
import { runColumn, runColumnInBackground } from '@rillage/sdk';

/** An invented record: rain every third day, steady outflows. */
const days = 3650;
const forcing = {
  start: '2015-01-01T00:00:00Z',
  stepDays: 1,
  inflow: Float64Array.from({ length: days }, (_value, k) => (k % 3 === 0 ? 9 : 0)),
  outflows: { discharge: new Float64Array(days).fill(1.8), evapotranspiration: new Float64Array(days).fill(1.2) },
  inflowConcentration: {},
};
const catchment = {
  initialStorage: 900,
  selection: {
    discharge: { form: 'gamma' as const, shape: 0.6, scale: 250 },
    evapotranspiration: { form: 'exponential' as const, scale: 50 },
  },
};

describe('runColumnInBackground in a browser', () => {
  for (const worker of [undefined, false] as const) {
    it(`gives the bits of runColumn ${worker === false ? 'in time slices' : 'in a worker of the same origin'}`, async () => {
      const here = runColumn(catchment, forcing, { youngerThan: [30] });
      const there = await runColumnInBackground(catchment, forcing, { youngerThan: [30] }, { worker });
      expect([...there.outflows['discharge']!.youngerShare.get(30)!]).to.deep.equal([...here.outflows['discharge']!.youngerShare.get(30)!]);
    });
  }

  it('holds no task of this thread longer than 50 ms while it computes here', async () => {
    let longest = 0;
    let last = performance.now();
    const beat = setInterval(() => {
      const now = performance.now();
      longest = Math.max(longest, now - last);
      last = now;
    }, 1);
    await new Promise((resolve) => setTimeout(resolve, 30));
    longest = 0;
    last = performance.now();
    await runColumnInBackground(catchment, forcing, { ageResolution: 0.01 }, { worker: false });
    clearInterval(beat);
    expect(longest).to.be.below(50);
  });
});
