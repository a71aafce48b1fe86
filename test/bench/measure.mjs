/** CPU milliseconds of `work`, repeated: the median and the spread, warmed. CPU time, since these machines are shared. */
export function measure(work, repeats) {
  work();
  const times = [];
  for (let r = 0; r < repeats; r++) {
    const before = process.cpuUsage();
    work();
    times.push(process.cpuUsage(before).user / 1000);
  }
  times.sort((a, b) => a - b);
  return { median: times[times.length >> 1], low: times[0], high: times[times.length - 1] };
}

/** Greatest absolute difference of two series; NaN against NaN is none. */
export function farthest(a, b) {
  let most = 0;
  for (let k = 0; k < a.length; k++) {
    if (Number.isNaN(a[k]) && Number.isNaN(b[k])) continue;
    const off = Math.abs(a[k] - b[k]);
    if (!(off <= most)) most = off;
  }
  return most;
}

export function rangeOf(values) {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return high - low;
}
