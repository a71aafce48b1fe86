import type { DistributionWithRange } from '@rillage/sdk';
import type { TemplateResult } from 'lit';
import type { Language } from '../shared/language.js';
import type { Curve } from './curve.js';
import type { Frame } from './axis.js';
import type { AgePlotKey } from './messages.js';

export type Speech = Language<AgePlotKey>;

/** One way to draw a distribution: its marks, what is said at each, and the same as a table. */
export interface View {
  series: number;
  /** Places of the points, px from the left, increasing. */
  places: number[];
  describe: (series: number, point: number) => string;
  /** @param point  where the cursor stands, or null */
  draw: (series: number, point: number | null) => TemplateResult;
  /** Share at the top of the axis. */
  top: number;
  /** Where the share beyond the record is drawn: hanging from the whole, as what the curve leaves, or standing as one more bar. */
  beyond: 'hanging' | 'standing';
  about: string;
  columns: string[];
  rows: string[][];
}

export interface Drawn {
  distribution: DistributionWithRange;
  middle: Curve;
  low: Curve | null;
  high: Curve | null;
  frame: Frame;
  speech: Speech;
}

export function curvesOf(distribution: DistributionWithRange): Pick<Drawn, 'middle' | 'low' | 'high'> {
  const ages = distribution.ageDays;
  const curve = (shares: ArrayLike<number> | null): Curve | null => shares && { ages, shares };
  return { middle: curve(distribution.youngerShare)!, low: curve(distribution.low), high: curve(distribution.high) };
}
