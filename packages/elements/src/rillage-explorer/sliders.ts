import type { Amount, Catchment, Selection } from '@rillage/sdk';

/** One number of a selection that a reader may change. */
export interface Slider {
  outflow: string;
  parameter: string;
  /** For a driven parameter: which of its values, with what it is driven by; else null. */
  driven: { index: number; at: number; driver: string } | null;
  value: number;
  low: number;
  high: number;
}

/** Reach of each parameter; every slider runs along its logarithm. Common practice for storages of tens to thousands of millimetres. */
const reach: Record<string, [low: number, high: number]> = {
  shape: [0.1, 5],
  scale: [5, 5000],
  depth: [10, 5000],
  from: [1, 500],
  a: [0.1, 10],
  b: [0.1, 10],
  exponent: [0.1, 3],
};

/** Forms that a reader may change to, with where their parameters begin. Others stay as the catchment brings them. */
export const startingForms: Record<string, Selection> = {
  gamma: { form: 'gamma', shape: 0.6, scale: 500 },
  exponential: { form: 'exponential', scale: 300 },
  uniform: { form: 'uniform', depth: 1000 },
};

/** The sliders of one outflow's selection, as its form has parameters. */
export function slidersOf(catchment: Catchment, outflow: string): Slider[] {
  const selection = catchment.selection[outflow] as unknown as Record<string, unknown>;
  return Object.keys(reach).flatMap((parameter): Slider[] => {
    const amount = Object.hasOwn(selection, parameter) ? (selection[parameter] as Amount) : undefined;
    if (amount === undefined) return [];
    const [low, high] = reach[parameter]!;
    const within = (value: number): Pick<Slider, 'value' | 'low' | 'high'> => ({
      value,
      low: Math.min(low, value > 0 ? value : low),
      high: Math.max(high, value),
    });
    if (typeof amount === 'number') return [{ outflow, parameter, driven: null, ...within(amount) }];
    const { at, value, driver } = amount;
    return value.map((one, index) => ({ outflow, parameter, driven: { index, at: at[index] ?? 0, driver }, ...within(one) }));
  });
}

/** The catchment with one slider moved; the given one is not changed. */
export function moved(catchment: Catchment, { outflow, parameter, driven }: Slider, value: number): Catchment {
  const selection = catchment.selection[outflow] as unknown as Record<string, Amount>;
  const before = selection[parameter]!;
  const amount: Amount =
    driven === null || typeof before === 'number'
      ? value
      : { ...before, value: before.value.map((one, index) => (index === driven.index ? value : one)) };
  return withSelection(catchment, outflow, { ...selection, [parameter]: amount } as unknown as Selection);
}

export const withSelection = (catchment: Catchment, outflow: string, selection: Selection): Catchment => ({
  ...catchment,
  selection: { ...catchment.selection, [outflow]: selection },
});

/** Places along a slider, whole numbers for `input type=range`. */
export const sliderSteps = 400;

export function placeOf({ value, low, high }: Slider): number {
  return Math.round((Math.log(Math.max(low, value) / low) / Math.log(high / low)) * sliderSteps);
}

/** The value at a place, to three digits. */
export function valueAt({ low, high }: Slider, place: number): number {
  return Number((low * (high / low) ** (place / sliderSteps)).toPrecision(3));
}
