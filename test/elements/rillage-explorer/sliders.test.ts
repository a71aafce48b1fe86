import { describe, expect, it } from 'vitest';
import type { Catchment } from '@rillage/sdk';
import { moved, placeOf, sliderSteps, slidersOf, valueAt } from '../../../packages/elements/src/rillage-explorer/sliders.js';

const catchment: Catchment = {
  initialStorage: 1000,
  selection: {
    stream: { form: 'gamma', shape: 0.6, scale: { driver: 'storage', at: [1, 2], value: [400, 100] } },
    plants: { form: 'mixture', parts: [] },
    drain: { form: 'uniform', depth: 9000 },
  },
};

describe('slidersOf(catchment, outflow)', () => {
  it('slidersOf() has one for each number, none for forms without', () => {
    expect(slidersOf(catchment, 'stream').map(({ parameter, driven, value }) => [parameter, driven?.index ?? null, value])).toEqual([
      ['shape', null, 0.6],
      ['scale', 0, 400],
      ['scale', 1, 100],
    ]);
    expect(slidersOf(catchment, 'plants')).toEqual([]);
  });

  it('slidersOf() reaches to a value beyond its usual ends', () => {
    expect(slidersOf(catchment, 'drain')[0]).toMatchObject({ low: 10, high: 9000, value: 9000 });
  });
});

describe('moved(catchment, slider, value)', () => {
  it('moved() changes one number and leaves the given catchment alone', () => {
    const before = structuredClone(catchment);
    const [shape, dry] = slidersOf(catchment, 'stream');
    expect(moved(catchment, shape!, 1.5).selection['stream']).toEqual({ ...catchment.selection['stream'], shape: 1.5 });
    expect(moved(catchment, dry!, 50).selection['stream']).toMatchObject({ scale: { driver: 'storage', at: [1, 2], value: [50, 100] } });
    expect(catchment).toEqual(before);
  });
});

describe('placeOf(slider) and valueAt(slider, place)', () => {
  it('placeOf() and valueAt() are each other’s inverse within a step', () => {
    const [shape] = slidersOf(catchment, 'stream');
    for (const place of [0, 1, 137, sliderSteps]) {
      expect(Math.abs(placeOf({ ...shape!, value: valueAt(shape!, place) }) - place)).toBeLessThanOrEqual(1);
    }
    expect(valueAt(shape!, 0)).toBe(0.1);
    expect(valueAt(shape!, sliderSteps)).toBe(5);
  });
});
