/** Today's reading of the invented catchment in the terminal: makes the stations from their CSV files, then reads the file as anyone would. */
import { readFile } from 'node:fs/promises';
import { readStation } from '@rillage/sdk';
import { writeRecordFile } from './build-section.mjs';
import { writeFittedStationFile } from './fitted-station.mjs';
import { writeFurtherStationFiles } from './further-stations.mjs';
import { publishAgencyFiles, publishStation } from './publish.mjs';
import { recordFiles } from './thessle-brook.mjs';

const WIDTH = 78;

// what the page of the column computes from
await writeRecordFile();

const file = await writeFittedStationFile();
const station = readStation(await readFile(file, 'utf8'));
await publishStation(station, file);
await writeFurtherStationFiles();
await publishAgencyFiles(recordFiles, new URL('../data/thessle-brook/', import.meta.url), new URL('files/', file));

const { name, reading } = station;
const percent = (share) => `${(100 * share).toFixed(1)} %`;
const range = (entry, unit) => (entry.range ? `likely ${unit(entry.range.low)} to ${unit(entry.range.high)}` : 'range not assessed');
const days = (value) => `${Math.round(value)} days`;

const lines = [`${name} (invented)`, '', ...(reading.sentences ?? [reading.sentence]).flatMap((sentence) => wrap(sentence)), ''];
if (reading.status === 'given') {
  for (const entry of reading.younger) {
    lines.push(
      row(
        `fell within ${entry.days} days`,
        entry.unplaced > 0 ? `at least ${percent(entry.share)}` : percent(entry.share),
        range(entry, percent),
      ),
    );
  }
  if (reading.median) {
    const median = reading.median.beyondRecord ? `more than ${days(reading.median.days)}` : days(reading.median.days);
    lines.push(row('median age', median, range(reading.median, days)));
  }
  lines.push(row('older than the record', percent(reading.olderThanRecord.share), range(reading.olderThanRecord, percent)), '');
}
const { evidence } = reading;
// The record ends where its last step does; a person names the day before that.
const lastDay = new Date(Date.parse(evidence.recordTo) - 1).toISOString().slice(0, 10);
lines.push(
  ...wrap(`Rests on the record from ${evidence.recordFrom.slice(0, 10)} to ${lastDay}. ${evidence.method} SDK ${evidence.version}.`),
  '',
  ...wrap(reading.caution),
);
console.log(lines.join('\n'));

function row(what, value, sure) {
  return `  ${what.padEnd(24)}${value.padStart(18)}   ${sure}`;
}

function wrap(text) {
  const out = [];
  let line = ' ';
  for (const word of text.split(' ')) {
    if (line.length + 1 + word.length > WIDTH) {
      out.push(line);
      line = ' ';
    }
    line += ` ${word}`;
  }
  return [...out, line];
}
