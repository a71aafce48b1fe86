import type { Holds } from '../layout.js';

/** What a header says its column holds: words of several languages (common practice of agencies' files). First match wins. */
const WORDS: readonly { test: RegExp; holds: Holds; as: string }[] = [
  { test: /(delta|d|δ)[-_ ]?(18[-_ ]?o|o[-_ ]?18)|18o/i, holds: 'streamTracer', as: 'd18O' },
  { test: /(delta|d|δ)[-_ ]?(2[-_ ]?h\b|h[-_ ]?2\b)|^(dd|δd)\b|deuterium/i, holds: 'streamTracer', as: 'd2H' },
  { test: /tritium|\b3h\b/i, holds: 'streamTracer', as: 'tritium' },
  { test: /chlori|chlorur|\bcl\b/i, holds: 'streamTracer', as: 'chloride' },
  { test: /nitrat|\bno3\b/i, holds: 'streamTracer', as: 'nitrate' },
  { test: /sul(f|ph)at/i, holds: 'streamTracer', as: 'sulfate' },
  { test: /dew|taupunkt/i, holds: 'dewPoint', as: '' },
  { test: /(hum|\brh|feucht).*max|max.*(hum|\brh)/i, holds: 'humidityMax', as: '' },
  { test: /(hum|\brh|feucht).*min|min.*(hum|\brh)/i, holds: 'humidityMin', as: '' },
  { test: /humid|\brh\b|feuchte/i, holds: 'humidityMean', as: '' },
  { test: /\bwind|windspeed|\bu2\b/i, holds: 'windSpeed', as: '' },
  { test: /sunshine|sonnenschein|insolation/i, holds: 'sunshine', as: '' },
  { test: /radiation|\brs\b|strahlung|rayonnement/i, holds: 'solarRadiation', as: '' },
  { test: /^(t|temp\w*|air.*temp\w*)[-_ ]*min|min\w*[-_ ]*(t\b|temp)|\btn\b/i, holds: 'tmin', as: '' },
  { test: /^(t|temp\w*|air.*temp\w*)[-_ ]*max|max\w*[-_ ]*(t\b|temp)|\btx\b/i, holds: 'tmax', as: '' },
  { test: /evap|verdunst|\b(a|p)?et0?\b/i, holds: 'outflow', as: 'evapotranspiration' },
  { test: /flow|discharge|abfluss|durchfluss|d[ée]bit|runoff|\bq\b|caudal|portata/i, holds: 'outflow', as: 'discharge' },
  { test: /rain|precip|prcp|\bppt\b|niederschlag|regen|pluie|lluvia|pioggia|\brr\b/i, holds: 'precipitation', as: '' },
  { test: /temp|\bt(mean|avg)?\b/i, holds: 'tmean', as: '' },
];

export function roleOf(header: string): { holds: Holds; as: string } | null {
  const text = header
    .replace(/[_.]/g, ' ')
    .replace(/[([{].*$/, '')
    .trim();
  return WORDS.find(({ test }) => test.test(text)) ?? null;
}

export const RAIN_WORDS = /rain|precip|niederschlag|regen|pluie|bulk|wet deposition/i;
export const STREAM_WORDS = /stream|river|brook|creek|gauge|bach|fluss|rivi|ruisseau|pegel|surface water/i;

/** Cells that agencies write for "no value" (common practice). */
export const ABSENT_WORDS: ReadonlySet<string> = new Set([
  'm',
  '.',
  '-',
  '--',
  '---',
  'na',
  'n/a',
  'n.a.',
  'nan',
  'null',
  'none',
  'nil',
  'missing',
  'x',
  '*',
  '**',
  '#n/a',
  '/',
  '//',
  '///',
  'lücke',
  'nd',
  'n.d.',
]);
/** Numbers that stand for "no value" where they could not be one (common practice). */
export const ABSENT_NUMBERS: readonly number[] = [
  -9999, -9999.9, -9999.99, -99999, -999, -999.9, -999.99, -99, -99.9, -99.99, -8888, -7777, -6999, -1, 9999, 9999.9, 99999, 99999.9,
  999999, 32767, -32768,
];
export const TRACE_WORDS: ReadonlySet<string> = new Set(['t', 'tr', 'tr.', 'trace', 'spur', 'traces']);
