import { existsSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { RillageError, runColumn, runColumnInBackground, type Catchment, type Forcing } from '@rillage/sdk';
import { benchCatchment, benchOptions, syntheticForcing } from '../../bench/forcing.mjs';

const catchment = benchCatchment as Catchment;
const forcing = syntheticForcing({ years: 4 }) as Forcing;
const entry = new URL('../../../packages/sdk/dist/workers/worker-entry.js', import.meta.url);
// the worker is the built file: a thread cannot run TypeScript
const ways: [string, false | string][] = [
  ['time slices', false],
  ...(existsSync(entry) ? [['a worker thread', entry.href] as [string, string]] : []),
];

describe.each(ways)('runColumnInBackground, in %s', (_way, worker) => {
  test('gives the bits of runColumn, and a checkpoint that goes on', async () => {
    const [here, there] = [
      runColumn(catchment, forcing, benchOptions),
      await runColumnInBackground(catchment, forcing, benchOptions, { worker }),
    ];
    expect(there.storage).toEqual(here.storage);
    expect(there.outflows['discharge'].youngerShare).toEqual(here.outflows['discharge'].youngerShare);
    expect(there.outflows['discharge'].concentration['d18O']).toEqual(here.outflows['discharge'].concentration['d18O']);
    expect(there.closure.water).toBe(here.closure.water);
    expect(there.checkpoint()).toEqual(here.checkpoint());
  });

  test('onProgress rises to 1', async () => {
    const seen: number[] = [];
    await runColumnInBackground(catchment, forcing, {}, { worker, onProgress: ({ done }) => seen.push(done) });
    expect(seen.length).toBeGreaterThan(1);
    expect(seen[seen.length - 1]).toBe(1);
    expect([...seen].sort((a, b) => a - b)).toEqual(seen);
  });

  test('refuses what runColumn refuses, with its code and place', async () => {
    const wrong = { ...forcing, inflow: forcing.inflow.map((mm, k) => (k === 7 ? -1 : mm)) };
    const error = await runColumnInBackground(catchment, wrong, {}, { worker }).catch((reason: unknown) => reason);
    expect(error).toBeInstanceOf(RillageError);
    expect(error).toMatchObject({ code: 'flux-negative', step: 7 });
  });

  test('a signal ends it within 50 ms', async () => {
    const controller = new AbortController();
    let raised = 0;
    setTimeout(() => {
      raised = performance.now();
      controller.abort();
    }, 60);
    const long = syntheticForcing({ years: 4, stepDays: 1 / 24 }) as Forcing;
    const error = await runColumnInBackground(catchment, long, { ageResolution: 0 }, { worker, signal: controller.signal }).catch(
      (reason: unknown) => reason,
    );
    // a step of the first weeks takes well below a millisecond; the limit is the contract's
    expect(performance.now() - raised).toBeLessThan(50);
    expect(error).toMatchObject({ code: 'aborted' });
  });
});

test('runColumnInBackground: a signal raised before it begins', async () => {
  const signal = AbortSignal.abort();
  await expect(runColumnInBackground(catchment, forcing, {}, { signal })).rejects.toMatchObject({ code: 'aborted' });
});
