import { frameMessages } from '../shared/chart-frame.js';
import { tableMessages } from '../shared/data-table.js';
import { amountMessages } from '../shared/format.js';

export const agePlotMessages = {
  ...amountMessages,
  ...frameMessages,
  ...tableMessages,
  'plot.name': 'How old the water in the stream is, {date}',
  'plot.nameOther': 'How old the water leaving as {of} is, {date}',
  'plot.nameStorage': 'How old the water in the ground is, {date}',
  'plot.invented': 'An invented station, for demonstration.',
  'plot.curve': 'Curve',
  'plot.density': 'By age',
  'plot.drops': 'Drops',
  'plot.logAges': 'Stretched ages',
  'plot.view': 'How it is drawn',
  'plot.week': 'a week',
  'plot.month': 'a month',
  'plot.season': 'a season',
  'plot.year': 'a year',
  'plot.tenYears': 'ten years',
  'plot.age': 'Age of the water',
  'plot.younger': 'Share younger',
  'plot.inClass': 'Share of this age',
  'plot.range': 'Likely range',
  'plot.drop': 'Drop',
  'plot.beforeRecord': 'Older than the record: {share}',
  'plot.beforeRecordRange': 'Older than the record: {share} ({range})',
  'plot.summaryHalf': 'Half of the water is older than {age}.',
  'plot.summaryHalfAbout': 'Half of the water is older than about {age}; the range is not assessed.',
  'plot.summaryHalfBeyond': 'More than half of the water is older than the record; its age is not known.',
  'plot.summaryBeyond': '{share} is older than the record of {record}: its age is not known, and no curve is drawn for it.',
  'plot.summaryAll': 'All of the water entered within the record of {record}.',
  'plot.readCurve': '{share} is younger than {age}; likely range {range}.',
  'plot.readCurveBare': '{share} is younger than {age}; range not assessed.',
  'plot.readLow': 'Lower end: {share} is younger than {age}.',
  'plot.readHigh': 'Upper end: {share} is younger than {age}.',
  'plot.readDensity': '{share} is between {from} and {to} old; at the widest {range}.',
  'plot.readDensityBare': '{share} is between {from} and {to} old; range not assessed.',
  'plot.readDrop': 'Drop {count} of {drops}: {age} old; likely range {range}.',
  'plot.readDropBare': 'Drop {count} of {drops}: {age} old; range not assessed.',
  'plot.readDropBeyond': 'Drop {count} of {drops}: older than the record, age not known.',
  'plot.aboutCurve':
    'The band is the likely range: the share of the water that is younger than the age below. Hatched: older than the record.',
  'plot.aboutCurveBare':
    'The line is the share of the water that is younger than the age below; its range is not assessed. Hatched: older than the record.',
  'plot.aboutDensity':
    'Each bar is the share of the water of that age. The strokes are the widest range that the band of the curve allows. Hatched: older than the record.',
  'plot.aboutDensityBare': 'Each bar is the share of the water of that age; ranges are not assessed. Hatched: older than the record.',
  'plot.aboutDrops':
    'Each drop is one litre in twenty, placed at its age; the stroke through it is its likely range. Hatched: older than the record.',
  'plot.aboutDropsBare': 'Each drop is one litre in twenty, placed at its age; ranges are not assessed. Hatched: older than the record.',
} as const;
export type AgePlotKey = keyof typeof agePlotMessages;
