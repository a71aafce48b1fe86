/**
 * The truth: every day's water kept as a parcel of its own, each outflow taken from the parcels by its known selection function at
 * sub-daily steps, first order in the step. Slow on purpose, and written without the SDK, so that the SDK can be held against it.
 * A driven scale is held over a day at the driver's mid-day value, which is how the model is defined.
 */
export function trackAges(station, water, { subSteps = station.subSteps, ages = [7, 30, 90, 365] } = {}) {
  const { initialStorage, selection, tracers } = station.truth;
  const names = Object.keys(tracers);
  const days = water.inflow.length;
  const table = gammaTable(selection.discharge.shape);
  const dt = 1 / subSteps;

  // Parcels oldest first, one for each day with inflow.
  const born = [];
  const depth = [];
  const mass = names.map(() => []);
  const toStream = new Float64Array(days);
  let preRecord = initialStorage;
  let storage = initialStorage;

  const truth = {
    younger: Object.fromEntries(ages.map((age) => [age, []])),
    medianDays: [],
    preRecordShare: [],
    concentration: {},
    storage: [],
  };
  names.forEach((name) => (truth.concentration[name] = []));

  for (let day = 0; day < days; day += 1) {
    const inflow = water.inflow[day];
    const q = water.discharge[day];
    const e = water.evapotranspiration[day];
    const anomaly = storage - initialStorage + (inflow - q - e) / 2;
    const streamScale = amount(selection.discharge.scale, anomaly);
    const plantScale = amount(selection.evapotranspiration.scale, anomaly);
    if (inflow > 0) {
      born.push(day);
      depth.push(0);
      mass.forEach((list) => list.push(0));
    }
    const newest = born.length - 1;
    toStream.fill(0, 0, born.length);
    let streamFromPreRecord = 0;
    const streamMass = names.map(() => 0);

    for (let sub = 0; sub < subSteps; sub += 1) {
      if (inflow > 0) {
        depth[newest] += inflow * dt;
        names.forEach((name, n) => (mass[n][newest] += inflow * dt * water.inflowTracers[name][day]));
      }
      let above = 0;
      let streamAbove = 0;
      let plantAbove = 0;
      for (let p = newest; p >= 0; p -= 1) {
        const held = depth[p];
        if (held <= 0) continue;
        above += held;
        const streamBelow = table(above / streamScale);
        const plantBelow = 1 - Math.exp(-above / plantScale);
        let stream = q * dt * (streamBelow - streamAbove);
        let plants = e * dt * (plantBelow - plantAbove);
        if (stream + plants > held) {
          const cut = held / (stream + plants);
          stream *= cut;
          plants *= cut;
        }
        streamAbove = streamBelow;
        plantAbove = plantBelow;
        const left = held - stream - plants;
        toStream[p] += stream;
        for (let n = 0; n < names.length; n += 1) {
          const concentration = mass[n][p] / held;
          const carried = tracers[names[n]].carriedShare?.evapotranspiration ?? 1;
          streamMass[n] += concentration * stream;
          mass[n][p] -= concentration * (stream + carried * plants);
        }
        depth[p] = left;
      }
      streamFromPreRecord += q * dt * (1 - streamAbove);
      preRecord -= q * dt * (1 - streamAbove) + e * dt * (1 - plantAbove);
    }
    storage += inflow - q - e;
    const total = toStream.subarray(0, born.length).reduce((sum, value) => sum + value, 0) + streamFromPreRecord;
    recordDay(truth, { day, born, toStream, total, streamFromPreRecord, ages });
    names.forEach((name, n) => truth.concentration[name].push((streamMass[n] + streamFromPreRecord * tracers[name].preRecord) / total));
    truth.storage.push(storage);
  }
  if (preRecord < 0) throw new Error('The invented catchment ran out of pre-record water; give it more initial storage.');
  truth.preRecordLeft = preRecord;
  return truth;
}

function recordDay(truth, { day, born, toStream, total, streamFromPreRecord, ages }) {
  const shares = ages.map(() => 0);
  let sum = 0;
  let median = null;
  for (let p = born.length - 1; p >= 0; p -= 1) {
    const oldest = day - born[p] + 1;
    const share = toStream[p] / total;
    if (median === null && sum + share >= 0.5) median = oldest - 1 + (0.5 - sum) / share;
    sum += share;
    ages.forEach((age, a) => {
      if (oldest <= age) shares[a] += share;
    });
  }
  ages.forEach((age, a) => truth.younger[age].push(shares[a]));
  truth.medianDays.push(median);
  truth.preRecordShare.push(streamFromPreRecord / total);
}

function amount(value, driver) {
  if (typeof value === 'number') return value;
  const { at, value: values } = value;
  if (driver <= at[0]) return values[0];
  for (let i = 1; i < at.length; i += 1) {
    if (driver <= at[i]) return values[i - 1] + ((values[i] - values[i - 1]) * (driver - at[i - 1])) / (at[i] - at[i - 1]);
  }
  return values[values.length - 1];
}

/**
 * Regularised incomplete gamma P(shape, x) from a table in u = x^shape, in which it starts as a straight line; built by Simpson's rule
 * on P(u) = ∫ exp(−u^(1/shape)) du / Γ(shape + 1). Linear between nodes, error below 1e-7.
 */
function gammaTable(shape) {
  const nodes = 20_000;
  const uMax = 40 ** shape;
  const h = uMax / nodes;
  const integrand = (u) => Math.exp(-(u ** (1 / shape)));
  const values = new Float64Array(nodes + 1);
  for (let i = 1; i <= nodes; i += 1) {
    const a = (i - 1) * h;
    values[i] = values[i - 1] + (h / 6) * (integrand(a) + 4 * integrand(a + h / 2) + integrand(a + h));
  }
  const whole = values[nodes];
  return (x) => {
    const position = x ** shape / h;
    if (position >= nodes) return 1;
    const i = Math.floor(position);
    return (values[i] + (values[i + 1] - values[i]) * (position - i)) / whole;
  };
}
