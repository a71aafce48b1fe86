import { nothing, svg } from 'lit';
import { age, olderThan, percent, percentSpan } from '../shared/format.js';
import { classSlices, type Frame } from './axis.js';
import { shareAt, type Curve } from './curve.js';
import type { Drawn, View } from './view.js';

/** The cumulative curve: its range as a band coloured by age, without a middle line; a bare line where no range was assessed. */
export function curveView({ distribution, middle, low, high, frame, speech }: Drawn): View {
  const stops = agesToRead(frame);
  const { x, y, top, bottom, em } = frame;
  const range = (days: number): { low: number; high: number } | null =>
    low && high && { low: shareAt(low, days), high: shareAt(high, days) };
  const series = [middle, ...(low && high ? [high, low] : [])];
  return {
    series: series.length,
    places: stops.map(x),
    top: 1,
    beyond: 'hanging',
    about: speech.say(low ? 'plot.aboutCurve' : 'plot.aboutCurveBare'),
    describe: (index, point) => {
      const days = stops[point]!;
      const share = percent(speech, shareAt(series[index]!, days));
      const key = index === 1 ? 'plot.readHigh' : index === 2 ? 'plot.readLow' : low ? 'plot.readCurve' : 'plot.readCurveBare';
      return speech.say(key, { share, age: age(speech, days), range: percentSpan(speech, range(days)) });
    },
    draw: (index, point) => svg`
      ${low && high ? band(frame, low, high) : svg`<path class="line" d=${line(frame, middle)} />`}
      ${
        point === null
          ? nothing
          : svg`<line class="cursor" x1=${x(stops[point]!)} x2=${x(stops[point]!)} y1=${top} y2=${bottom} />
              <circle class="cursor" cx=${x(stops[point]!)} cy=${y(shareAt(series[index]!, stops[point]!))} r=${0.35 * em} />`
      }`,
    columns: [speech.say('plot.age'), speech.say('plot.younger'), speech.say('plot.range')],
    rows: [
      ...stops.map((days) => [age(speech, days), percent(speech, shareAt(middle, days)), percentSpan(speech, range(days))]),
      [
        olderThan(speech, distribution.recordDays),
        percent(speech, distribution.preRecordShare),
        percentSpan(speech, distribution.preRecordRange),
      ],
    ],
  };
}

/** Ages the cursor stops at and the table lists: round ones people use, within the record, and the record's own. */
export function agesToRead({ youngest, recordDays }: Frame): number[] {
  return [...round.filter((days) => days >= youngest && days < recordDays * 0.97), recordDays];
}

const round = [
  1, 2, 3, 5, 7, 10, 14, 21, 30, 45, 60, 91, 122, 152, 183, 274, 365, 548, 731, 1096, 1461, 2192, 2922, 3652, 5479, 7305, 10957, 18262,
  36525,
];

function band(frame: Frame, low: Curve, high: Curve): unknown {
  return svg`${classSlices(frame).map(({ from, to, className }) => {
    const back = points(frame, low, from, to).reverse();
    return svg`<path class=${className} d=${`M${[...points(frame, high, from, to), ...back].join('L')}Z`} />`;
  })}
  <path class="line thin" d=${line(frame, high)} />
  <path class="line thin" d=${line(frame, low)} />`;
}

const line = (frame: Frame, curve: Curve): string => `M${points(frame, curve, frame.youngest, frame.recordDays).join('L')}`;

/** One point every two pixels: no more can be seen, however many parcels there are. */
function points({ x, y, ageAt }: Frame, curve: Curve, from: number, to: number): string[] {
  const count = Math.max(1, Math.ceil((x(to) - x(from)) / 2));
  return Array.from({ length: count + 1 }, (_, index) => {
    const place = x(from) + ((x(to) - x(from)) * index) / count;
    const days = index === 0 ? from : index === count ? to : ageAt(place);
    return `${place.toFixed(1)} ${y(shareAt(curve, days)).toFixed(1)}`;
  });
}
