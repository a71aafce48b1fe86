const CHLORIDE_LIMIT = 0.8;
const SECONDS_PER_DAY = 86_400;

/**
 * The agency's CSV files with the agency's habits: comment lines, a unit row, trace rain `T`, the sentinel −9999, missing days, a
 * repeated row, decimal commas with semicolons and day-first dates from the laboratory, `<` below detection, lost bottles.
 */
export function agencyFiles(station, { weather, water, samples }) {
  const days = weather.days - (station.daysAfter ?? 0);
  const flow = (day) => ((water.discharge[day] * station.areaKm2 * 1000) / SECONDS_PER_DAY).toFixed(3);
  const rain = (day) => (weather.trace[day] ? 'T' : weather.rain[day].toFixed(1));
  const invented = `# INVENTED DATA. ${station.note}`;
  const broken = habits(weather, days);

  const weatherLines = [
    invented,
    `# ${station.agency}, weather station of ${station.name}`,
    '# day totals from 00:00 to 24:00 UTC; T = trace; -9999 = instrument failure',
    'date,rain,tmin,tmax',
    ',mm,degC,degC',
  ];
  const flowLines = [invented, `# ${station.agency}, gauge ${station.name}, area ${station.areaKm2} km2`, 'day,flow_m3s,remark'];
  for (let day = 0; day < days; day += 1) {
    const greatest = broken.temperature.has(day) ? '-9999' : weather.greatest[day].toFixed(1);
    weatherLines.push(`${weather.dates[day]},${broken.rain.has(day) ? '-9999' : rain(day)},${weather.least[day].toFixed(1)},${greatest}`);
    if (broken.flowMissing.has(day)) continue;
    const row = `${weather.dates[day]},${flow(day)},${broken.flowRemark.has(day) ? 'weeds cut' : ''}`;
    flowLines.push(row);
    if (broken.flowTwice.has(day)) flowLines.push(row);
  }

  const streamLines = [invented, 'Probe;Datum;d18O;d2H;Chlorid', ';;permil;permil;mg/L'];
  samples.stream.forEach((sample, index) => {
    const { d18O, d2H, chloride } = sample.values;
    const cells = sample.lost ? ['', '', ''] : [comma(d18O, 2), comma(d2H, 1), comma(chloride, 2)];
    streamLines.push([`S${String(index + 1).padStart(4, '0')}`, dayFirst(sample.date), ...cells].join(';'));
  });

  const rainLines = [
    invented,
    '# bulk samples: all rain from the first to the last day named, both included',
    'from,to,d18O,d2H,chloride',
    ',,permil,permil,mg/L',
  ];
  samples.rain.forEach((sample) => {
    const { d18O, d2H, chloride } = sample.values;
    const salt = chloride < CHLORIDE_LIMIT ? `<${CHLORIDE_LIMIT}` : chloride.toFixed(2);
    const cells = sample.lost ? ['', '', ''] : [d18O.toFixed(2), d2H.toFixed(1), salt];
    rainLines.push([sample.from, sample.to, ...cells].join(','));
  });

  const nextLines = [
    invented,
    '# the days after the record, as telemetry brings them',
    'date,rain,tmin,tmax,flow_m3s',
    ',mm,degC,degC,m3/s',
  ];
  for (let day = days; day < weather.days; day += 1) {
    nextLines.push(`${weather.dates[day]},${rain(day)},${weather.least[day].toFixed(1)},${weather.greatest[day].toFixed(1)},${flow(day)}`);
  }

  const files = {
    'weather.csv': weatherLines,
    'flow.csv': flowLines,
    'stream-samples.csv': streamLines,
    'rain-samples.csv': rainLines,
    'next-days.csv': nextLines,
  };
  return Object.fromEntries(Object.entries(files).map(([name, lines]) => [name, `${lines.join('\n')}\n`]));
}

/** Which days the instruments failed on: dry spells for the rain gauge, recessions for the flow gauge, so that a named rule can mend them. */
function habits(weather, days) {
  const dry = (day, reach) => {
    for (let d = day - reach; d <= day + reach; d += 1) if (weather.rain[d] !== 0 || weather.trace[d]) return false;
    return true;
  };
  const nextDry = (from, reach) => {
    let day = Math.min(from, days - 200);
    while (!dry(day, reach)) day += 1;
    return day;
  };
  const gap = nextDry(Math.floor(days * 0.44), 3);
  const failed = nextDry(Math.floor(days * 0.71), 2);
  return {
    rain: new Set([failed]),
    temperature: new Set([Math.floor(days * 0.3), Math.floor(days * 0.3) + 1]),
    flowMissing: new Set([gap - 1, gap, gap + 1]),
    flowRemark: new Set([Math.floor(days * 0.62)]),
    flowTwice: new Set([Math.floor(days * 0.85)]),
  };
}

function comma(value, digits) {
  return value.toFixed(digits).replace('.', ',');
}

function dayFirst(date) {
  const [year, month, day] = date.split('-');
  return `${day}.${month}.${year}`;
}
