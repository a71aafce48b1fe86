import { nothing, svg } from 'lit';
import { ageClass } from '../shared/age-ramp.js';
import { age, percent, percentSpan } from '../shared/format.js';
import { shareAt } from './curve.js';
import type { Drawn, View } from './view.js';

/**
 * The share of the water of each age as bars of equal width on the axis, so that height is share. The curve's band bounds a bar only widely:
 * between what the lower curve's rise over the upper's start leaves and what the upper's rise over the lower's start allows.
 */
export function densityView({ distribution, middle, low, high, frame, speech }: Drawn): View {
  const { x, left, edge, ageAt, youngest } = frame;
  const count = Math.max(8, Math.min(16, Math.round((edge - left) / (3 * frame.em))));
  const bars = Array.from({ length: count }, (_, index) => {
    const place = (step: number): number => left + ((edge - left) * step) / count;
    const from = index ? ageAt(place(index)) : 0;
    const to = index === count - 1 ? frame.recordDays : ageAt(place(index + 1));
    return {
      ...{ from, to, left: place(index), right: place(index + 1) },
      share: shareAt(middle, to) - shareAt(middle, from),
      range: low &&
        high && { low: Math.max(0, shareAt(low, to) - shareAt(high, from)), high: Math.min(1, shareAt(high, to) - shareAt(low, from)) },
    };
  });
  const highest = Math.max(
    ...bars.map(({ share, range }) => range?.high ?? share),
    distribution.preRecordRange?.high ?? distribution.preRecordShare,
  );
  const top = tops.find((value) => value >= highest) ?? 1;
  const y = (share: number): number => frame.y(share / top);
  const fromText = (days: number): string => age(speech, days > youngest ? days : 0);
  return {
    series: 1,
    places: bars.map((bar) => (bar.left + bar.right) / 2),
    top,
    beyond: 'standing',
    about: speech.say(low ? 'plot.aboutDensity' : 'plot.aboutDensityBare'),
    describe: (_, point) => {
      const { share, from, to, range } = bars[point]!;
      const values = { share: percent(speech, share), from: fromText(from), to: age(speech, to), range: percentSpan(speech, range) };
      return speech.say(range ? 'plot.readDensity' : 'plot.readDensityBare', values);
    },
    draw: (_, point) => svg`${bars.map((bar, index) => {
      const middleX = (bar.left + bar.right) / 2;
      const colour = ageClass(Math.sqrt(Math.max(bar.from, youngest, 0.5) * bar.to));
      return svg`<rect class="age-${colour} ink bar" x=${bar.left} width=${bar.right - bar.left} y=${y(bar.share)} height=${y(0) - y(bar.share)} />
        ${bar.range ? svg`<line class="range" x1=${middleX} x2=${middleX} y1=${y(bar.range.low)} y2=${y(bar.range.high)} />` : nothing}
        ${index === point ? svg`<rect class="cursor" x=${bar.left} width=${bar.right - bar.left} y=${frame.top} height=${frame.bottom - frame.top} />` : nothing}`;
    })}
    <line class="tick" x1=${x(youngest)} x2=${edge} y1=${y(0)} y2=${y(0)} />`,
    columns: [speech.say('plot.age'), speech.say('plot.inClass'), speech.say('plot.range')],
    rows: bars.map(({ from, to, share, range }) => [
      speech.say('amount.span', { low: fromText(from), high: age(speech, to) }),
      percent(speech, share),
      percentSpan(speech, range),
    ]),
  };
}

/** Shares the axis may end at; each halves and quarters into whole per cents. */
const tops = [0.04, 0.08, 0.2, 0.4, 0.6, 0.8, 1];
