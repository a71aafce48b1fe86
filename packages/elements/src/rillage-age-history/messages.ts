import { frameMessages } from '../shared/chart-frame.js';
import { tableMessages } from '../shared/data-table.js';
import { amountMessages } from '../shared/format.js';

export const ageHistoryMessages = {
  ...amountMessages,
  ...frameMessages,
  ...tableMessages,
  'history.name': 'The flow of the stream by the age of its water',
  'history.invented': 'An invented station, for demonstration.',
  'history.summary':
    'From {from} to {to}, oldest water at the base. Of all that flowed, {young} was younger than {limit}, and {beyond} was in the ground before the record began.',
  'history.flow': 'Stream, mm a day',
  'history.flowMeans': 'Stream, mm a day, means over {days}',
  'history.shares': 'Shares',
  'history.median': 'Median age',
  'history.medianBare': 'Median age (range not assessed)',
  'history.below': 'What is drawn beneath',
  'history.closer': 'Closer',
  'history.wider': 'Wider',
  'history.earlier': 'Earlier',
  'history.later': 'Later',
  'history.all': 'All',
  'history.window': 'The span of time shown',
  'history.upTo': 'up to {age}',
  'history.between': '{from} to {to}',
  'history.older': 'older than {age}',
  'history.preRecord': 'before the record',
  'history.date': 'Day',
  'history.medianRange': 'Median age, likely range',
  'history.readAll': '{date}: {flow} mm. {shares}',
  'history.readClass': '{date}: {share} of the water is {name}.',
  'history.readMedian': '{date}: half of the water is older than {age}; likely range {range}.',
  'history.readMedianBeyond': '{date}: more than half of the water is older than the record.',
  'history.dry': '{date}: no flow.',
  'history.simulated': '{tracer}, simulated',
  'history.aboutShares': 'Beneath: the same as shares of the flow. Drag across the picture, or use the buttons, to look closer.',
  'history.aboutMedian':
    'Beneath: the likely range of the median age. Hatched: older than the record. Drag across the picture, or use the buttons, to look closer.',
  'history.aboutMedianBare':
    'Beneath: the median age; its range is not assessed. Hatched: older than the record. Drag across the picture, or use the buttons, to look closer.',
  'history.aboutTracer':
    'Beneath: the line is simulated, its range is not drawn; circles are bottles with their stated error. Drag across the picture, or use the buttons, to look closer.',
  'history.noSamples':
    'Beneath: the line is simulated, its range is not drawn; no bottles are given. Drag across the picture, or use the buttons, to look closer.',
} as const;
export type AgeHistoryKey = keyof typeof ageHistoryMessages;
