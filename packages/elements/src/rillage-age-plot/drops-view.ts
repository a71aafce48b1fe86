import { nothing, svg, type TemplateResult } from 'lit';
import { ageClass } from '../shared/age-ramp.js';
import { age, ageSpan, olderThan } from '../shared/format.js';
import { ageAt } from './curve.js';
import type { Drawn, View } from './view.js';

const drops = 20;

interface Drop {
  /** Days; Infinity beyond the record. */
  middle: number;
  /** Ends of its range, days; Infinity beyond the record. null where not assessed. */
  range: { low: number; high: number } | null;
}

/** Twenty drops, youngest at the foot, each at the age of the middle of its twentieth, with a stroke through it for its range. */
export function dropsView({ middle, low, high, frame, speech }: Drawn): View {
  const { x, y, edge, right, em, recordDays } = frame;
  const all: Drop[] = Array.from({ length: drops }, (_, index) => {
    const share = (index + 0.5) / drops;
    // The upper curve reaches a share first: it gives the younger end.
    return { middle: ageAt(middle, share), range: low && high && { low: ageAt(high, share), high: ageAt(low, share) } };
  });
  const place = (days: number): number => (days <= recordDays ? x(days) : (edge + right) / 2);
  const radius = Math.min(0.55 * em, ((y(0) - y(1)) / drops) * 0.46);
  const rangeText = ({ low: from, high: to }: { low: number; high: number }): string =>
    to <= recordDays
      ? ageSpan(speech, from, to)
      : from <= recordDays
        ? ageSpan(speech, from, recordDays, true)
        : olderThan(speech, recordDays);
  return {
    series: 1,
    places: all.map(({ middle: days }) => place(days)),
    top: 1,
    beyond: 'hanging',
    about: speech.say(low ? 'plot.aboutDrops' : 'plot.aboutDropsBare'),
    describe: (_, point) => {
      const { middle: days, range } = all[point]!;
      const values = { count: point + 1, drops, age: days <= recordDays ? age(speech, days) : '', range: range ? rangeText(range) : '' };
      return speech.say(days > recordDays ? 'plot.readDropBeyond' : range ? 'plot.readDrop' : 'plot.readDropBare', values);
    },
    draw: (_, point) =>
      svg`${all.map((drop, index) => {
        const at = { x: place(drop.middle), y: y((index + 0.5) / drops), radius };
        const ends = drop.range && {
          from: Math.min(edge, place(drop.range.low)),
          to: drop.range.high <= recordDays ? x(drop.range.high) : edge,
        };
        return svg`
        ${ends && ends.from < ends.to ? svg`<line class="range" x1=${ends.from} x2=${ends.to} y1=${at.y} y2=${at.y} />` : nothing}
        ${drop.middle <= recordDays ? svg`<path class="age-${ageClass(drop.middle)} ink" d=${dropPath(at)} />` : hollow(at)}
        ${index === point ? svg`<circle class="cursor" cx=${at.x} cy=${at.y} r=${radius + 4} />` : nothing}`;
      })}`,
    columns: [speech.say('plot.drop'), speech.say('plot.age'), speech.say('plot.range')],
    rows: all.map(({ middle: days, range }, index) => [
      `${index + 1}`,
      days <= recordDays ? age(speech, days) : olderThan(speech, recordDays),
      range ? rangeText(range) : speech.say('amount.unassessed'),
    ]),
  };
}

interface Place {
  x: number;
  y: number;
  radius: number;
}

/** A drop: a circle drawn up to a point. */
function dropPath({ x, y, radius }: Place): string {
  const side = radius * 0.86;
  return `M${x} ${y - radius * 1.5}L${x + side} ${y - radius * 0.35}A${radius} ${radius} 0 1 1 ${x - side} ${y - radius * 0.35}Z`;
}

/** A drop without a known age: hatched by two strokes, never coloured. */
function hollow(at: Place): TemplateResult {
  const reach = at.radius * 0.7;
  return svg`<path class="ground ink" d=${dropPath(at)} />
    <path class="hatch" d=${`M${at.x - reach} ${at.y + reach * 0.5}L${at.x + reach * 0.5} ${at.y - reach}M${at.x - reach * 0.4} ${at.y + reach}L${at.x + reach} ${at.y - reach * 0.4}`} />`;
}
