import { svg, type SVGTemplateResult } from 'lit';
import type { ParameterDiagnosis, TracerDiagnosis } from '@rillage/sdk';

const STRIP = { width: 160, height: 14 };
export const SCATTER = { width: 720, height: 220, start: 52, end: 8, top: 8, bottom: 24 };

/** The prior's 5 to 95 % as a hairline, the posterior's as a bar upon it; along the logarithm where both ends are of one sign and far apart. */
export function strip({ before, after }: Pick<ParameterDiagnosis, 'before' | 'after'>): SVGTemplateResult {
  const low = Math.min(before[0], after[0]);
  const high = Math.max(before[2], after[2]);
  const logarithmic = low > 0 && high / low > 20;
  const along = (value: number): number => (logarithmic ? Math.log(value) : value);
  const place = (value: number): number => 2 + ((STRIP.width - 4) * (along(value) - along(low))) / (along(high) - along(low) || 1);
  const middle = STRIP.height / 2;
  return svg`<svg class="strip" viewBox="0 0 ${STRIP.width} ${STRIP.height}" width=${STRIP.width} height=${STRIP.height} aria-hidden="true">
    <line x1=${place(before[0])} x2=${place(before[2])} y1=${middle} y2=${middle}></line>
    <rect x=${place(after[0])} width=${Math.max(2, place(after[2]) - place(after[0]))} y=${middle - 3} height="6"></rect>
  </svg>`;
}

type Residual = TracerDiagnosis['residuals'][number];
export const isInside = ({ measured, low, high }: Residual): boolean => measured >= low && measured <= high;

/** Each sample as a dot in the 5 to 95 % range foretold for it, a line; a cross where it lies outside. */
export function scatter(
  residuals: readonly Residual[],
  label: string,
  format: (value: number) => string,
  years: (time: number) => string,
): SVGTemplateResult {
  const times = residuals.map(({ at }) => Date.parse(at));
  const from = Math.min(...times);
  const until = Math.max(...times);
  const low = Math.min(...residuals.map((one) => Math.min(one.low, one.measured)));
  const high = Math.max(...residuals.map((one) => Math.max(one.high, one.measured)));
  const { width, height, start, end, top, bottom } = SCATTER;
  const x = (time: number): number => start + ((width - start - end) * (time - from)) / (until - from || 1);
  const y = (value: number): number => height - bottom - ((height - top - bottom) * (value - low)) / (high - low || 1);
  const first = new Date(from).getUTCFullYear() + 1;
  const all = Array.from({ length: Math.max(0, new Date(until).getUTCFullYear() - first + 1) }, (_, k) => Date.UTC(first + k, 0, 1));
  const step = Math.ceil(all.length / 8) || 1;
  const round = (value: number): number => Math.round(value * 10) / 10;
  const ranges = residuals.map((one, k) => `M${round(x(times[k]!))} ${round(y(one.low))}V${round(y(one.high))}`).join('');
  const dots = residuals.map((one, k) => {
    const [cx, cy] = [round(x(times[k]!)), round(y(one.measured))];
    return isInside(one) ? `M${cx - 1.5} ${cy}h3m-1.5 -1.5v3` : `M${cx - 3} ${cy - 3}l6 6m0 -6l-6 6`;
  });
  return svg`<svg class="scatter" viewBox="0 0 ${width} ${height}" role="img" aria-label=${label}>
    ${[low, (low + high) / 2, high].map(
      (value) => svg`<line class="rule" x1=${start} x2=${width - end} y1=${y(value)} y2=${y(value)}></line>
        <text x=${start - 6} y=${y(value) + 4} text-anchor="end">${format(value)}</text>`,
    )}
    ${all
      .filter((_, k) => k % step === 0)
      .map(
        (time) => svg`<line class="rule" x1=${x(time)} x2=${x(time)} y1=${height - bottom} y2=${height - bottom + 5}></line>
        <text x=${x(time)} y=${height - 6} text-anchor="middle">${years(time)}</text>`,
      )}
    <path class="ranges" d=${ranges}></path>
    <path class="dots" d=${dots.join('')}></path>
  </svg>`;
}
